import { textPieces } from './text-pieces';

const origin = 'http://127.0.0.1:4000';

test('a link to this place can be followed, with what stands around it kept', () => {
  expect(textPieces(`Open: ${origin}/m/abc-1_2.\nThank you`, origin)).toEqual([
    { says: 'Open: ', href: null },
    { says: `${origin}/m/abc-1_2`, href: '/m/abc-1_2' },
    { says: '.\nThank you', href: null },
  ]);
});

test.each(['https://example.org/m/abc', 'javascript:alert(1)', 'http://127.0.0.1:9/i/x'])(
  '%s cannot',
  (body) => {
    expect(textPieces(body, origin).every(({ href }) => href === null)).toBe(true);
  },
);
