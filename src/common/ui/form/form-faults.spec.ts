import { addOrderRequest } from '../../../../shared/contracts/orders';
import { issuesByPath } from './form-faults';

const issue = (path: (string | number)[], message: string) => ({ path, message });

test('sentences of the contracts stand by dotted path, in the words of the screen', () => {
  const says = issuesByPath([
    issue(['familyMembers', 0, 'phone'], 'Give a telephone number with its area code.'),
    issue(['note'], 'At most 200 characters.'),
  ]);
  expect(says.get('familyMembers.0.phone')).toBe('Give a telephone number with its area code.');
  expect(says.get('note')).toBe('At most 200 characters.');
});

test('what zod says for programmers is never shown', () => {
  const parsed = addOrderRequest.safeParse({});
  const says = [...issuesByPath(parsed.error?.issues ?? []).values()];
  expect(says.length).toBeGreaterThan(3);
  expect(says.join(' ')).not.toMatch(/Invalid|expected|received/);
});
