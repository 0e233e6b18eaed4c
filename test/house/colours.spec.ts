import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';

const src = join(__dirname, '..', '..', 'src');
const isTheme = (file: string): boolean => file.startsWith(join('common', 'theme'));
const isPicture = (file: string): boolean => file.startsWith(join('common', 'pictures'));

/** Colours of a style sheet or template that come from no token. */
function ownColours(text: string): string[] {
  const withoutEntities = text.replace(/&#x?[0-9a-f]+;/gi, '').replace(/\/\*[\s\S]*?\*\//g, '');
  return withoutEntities.match(/(?<![\w&-])#(?:[0-9a-f]{3,4}|[0-9a-f]{6}|[0-9a-f]{8})\b/gi) ?? [];
}

describe('colours come from the theme', () => {
  const files = readdirSync(src, { recursive: true, encoding: 'utf8' }).filter(
    (file) => /\.(scss|css|html)$/.test(file) && !isTheme(file) && !isPicture(file),
  );

  it('finds the style sheets of the screens', () => {
    expect(files.filter((file) => file.endsWith('.scss'))).not.toEqual([]);
  });

  it('finds a colour where there is one', () => {
    expect(ownColours('a { color: #fff; background: #0b3d91 }')).toEqual(['#fff', '#0b3d91']);
    expect(ownColours('a { color: var(--td-ink) } <a href="#main">')).toEqual([]);
  });

  it('no screen and no piece of a page writes a colour itself', () => {
    const found = files
      .filter((file) => !file.endsWith('index.html'))
      .flatMap((file) =>
        ownColours(readFileSync(join(src, file), 'utf8')).map((colour) => `${file}: ${colour}`),
      );
    expect(found).toEqual([]);
  });
});
