import { phoneWords } from './phone-words';

test.each([
  ['+13125550142', '312-555-0142'],
  ['+525555550142', '+525555550142'],
  ['555-0142', '555-0142'],
])('%s reads %s', (phone, words) => {
  expect(phoneWords(phone)).toBe(words);
});
