import { FamilyFailure, type FailureKind } from '../../../common/api/family/family-failure';
import { linkState } from './link-state';

const failure = (kind: FailureKind, code: string) =>
  new FamilyFailure(kind, { type: 'about:blank', title: 'No.', status: 422, code, triesLeft: 3 });

describe('what a refusal says about a link', () => {
  it.each([
    ['birth-date-wrong', 'wrong-date'],
    ['link-expired', 'expired'],
    ['link-used', 'used'],
    ['link-locked', 'locked'],
    ['link-unknown', 'unknown'],
  ])('%s is %s', (code, state) => {
    expect(linkState(failure('refused', code))).toBe(state);
  });

  it.each(['unreached', 'broken', 'too-often'] as const)(
    'says nothing about the link when it is %s',
    (kind) => {
      expect(linkState(failure(kind, 'link-used'))).toBeNull();
    },
  );

  it('says nothing when the refusal is about something else', () => {
    expect(linkState(failure('refused', 'bad-input'))).toBeNull();
  });

  it('brings the tries that are left', () => {
    expect(failure('refused', 'birth-date-wrong').number('triesLeft')).toBe(3);
    expect(failure('refused', 'birth-date-wrong').number('code')).toBeNull();
  });
});
