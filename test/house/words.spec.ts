import { spawnSync } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';

const script = join(__dirname, '..', '..', 'server', 'bootstrap', 'check-words.mjs');

const unit = (id: string, source: string, target?: string): string =>
  `<unit id="${id}"><segment><source>${source}</source>${
    target === undefined ? '' : `<target>${target}</target>`
  }</segment></unit>`;

const xliff = (units: string[], language?: string): string =>
  `<xliff version="2.0" srcLang="en"${language ? ` trgLang="${language}"` : ''}><file id="f">${units.join('\n')}</file></xliff>\n`;

const time = '<ph id="0" equiv="INTERPOLATION" disp="{{ time }}"/>';
const title = 'Three mornings';
const come = `Come at ${time}`;
const hours = `{VAR_PLURAL, plural, =1 {one hour} other {${time} hours}}`;
const english = [unit('a.title', title), unit('a.come', come), unit('a.hours', hours)];

const arabicHours = `{VAR_PLURAL, plural, zero {0} one {1} two {2} few {${time} f} many {${time} m} other {${time} o}}`;
const arabic = [
  unit('a.title', title, 'ثلاثة صباحات'),
  unit('a.come', come, `تعال ${time}`),
  unit('a.hours', hours, arabicHours),
];

let folder: string;

beforeEach(() => {
  folder = mkdtempSync(join(tmpdir(), 'threedawn-words-'));
  mkdirSync(join(folder, 'locales', 'ui'), { recursive: true });
  write('family.xlf', xliff(english));
});

afterEach(() => rmSync(folder, { recursive: true }));

function write(name: string, text: string): void {
  writeFileSync(join(folder, 'locales', 'ui', name), text);
}

/** What the check says about a checkout with these languages. */
function check(languages: string[]): { status: number | null; faults: string } {
  const locales = Object.fromEntries(
    languages.map((language) => [
      language,
      { translation: `locales/ui/family.${language}.xlf`, subPath: language },
    ]),
  );
  writeFileSync(
    join(folder, 'angular.json'),
    JSON.stringify({ projects: { family: { i18n: { locales } } } }),
  );
  const { status, stderr } = spawnSync(process.execPath, [script, folder], { encoding: 'utf8' });
  return { status, faults: stderr };
}

const changed = (index: number, text: string): string[] =>
  arabic.map((one, position) => (position === index ? text : one));

describe('the check of translations', () => {
  it('passes English alone', () => {
    expect(check([])).toEqual({ status: 0, faults: '' });
  });

  it('passes a whole translation', () => {
    write('family.ar.xlf', xliff(arabic, 'ar'));
    expect(check(['ar'])).toEqual({ status: 0, faults: '' });
  });

  it('lets a plural within a plural stand once for each form, and wants every one whole', () => {
    const minutes = (variable: string, forms: string): string =>
      `{${variable}, plural, ${forms.replaceAll('_', time)}}`;
    const both = `{H, plural, =1 {${minutes('A', '=1 {1} other {_}')}} other {${minutes('B', '=1 {1} other {_}')}}}`;
    const six = 'zero {_} one {_} two {_} few {_} many {_} other {_}';
    const nested = (variable: string): string =>
      ['zero', 'one', 'two', 'few', 'many', 'other']
        .map((form) => `${form} {${minutes(form === 'one' ? 'A' : variable, six)}}`)
        .join(' ');
    write('family.xlf', xliff([unit('a.left', both)]));
    write('family.ar.xlf', xliff([unit('a.left', both, `{H, plural, ${nested('B')}}`)], 'ar'));
    expect(check(['ar'])).toEqual({ status: 0, faults: '' });
    const lacking = nested('B').replace(`many {${time}}`, '');
    write('family.ar.xlf', xliff([unit('a.left', both, `{H, plural, ${lacking}}`)], 'ar'));
    expect(check(['ar']).faults).toContain('no form for "many"');
    write('family.ar.xlf', xliff([unit('a.left', both, `{H, plural, ${nested('A')}}`)], 'ar'));
    expect(check(['ar']).faults).toContain('other plural');
  });

  it.each<[fault: string, file: string, words: string]>([
    ['a missing unit', xliff(arabic.slice(1), 'ar'), '"a.title" is missing'],
    ['a unit left over', xliff([...arabic, unit('a.old', 'x', 'y')], 'ar'), '"a.old" is left over'],
    [
      'another source',
      xliff(changed(0, unit('a.title', 'Two', 'ص')), 'ar'),
      'another English text',
    ],
    ['an empty target', xliff(changed(0, unit('a.title', title, ' ')), 'ar'), 'no translation'],
    ['no target', xliff(changed(0, unit('a.title', title)), 'ar'), 'no translation'],
    ['a lost value', xliff(changed(1, unit('a.come', come, 'تعال')), 'ar'), 'lost {INTERPOLATION}'],
    [
      'an invented value',
      xliff(changed(0, unit('a.title', title, `ص ${time}`)), 'ar'),
      'invented {INTERPOLATION}',
    ],
    [
      'a missing plural form',
      xliff(changed(2, unit('a.hours', hours, arabicHours.replace('few', '=7'))), 'ar'),
      'no form for "few"',
    ],
    [
      'a plural made flat',
      xliff(changed(2, unit('a.hours', hours, `ساعات ${time}`)), 'ar'),
      'other plural',
    ],
    ['a file cut off', xliff(arabic, 'ar').slice(0, -40), 'cut off'],
    ['an id twice', xliff([...arabic, unit('a.title', title, 'x')], 'ar'), 'appears twice'],
    ['the wrong language', xliff(arabic, 'fa'), 'trgLang is "fa"'],
  ])('finds %s', (_fault, file, words) => {
    write('family.ar.xlf', file);
    const { status, faults } = check(['ar']);
    expect(faults).toContain(words);
    expect(status).toBe(1);
  });

  it('finds a translation that no application is built from, and one that is not there', () => {
    write('family.vi.xlf', xliff([], 'vi'));
    expect(check(['ar']).faults).toMatch(/family\.ar\.xlf: the file is missing[\s\S]*family\.vi/);
  });

  it('lets the general form stand for the millions of Spanish', () => {
    const spanish = [
      unit('a.title', title, 'Tres mañanas'),
      unit('a.come', come, `Venga a las ${time}`),
      unit('a.hours', hours, `{VAR_PLURAL, plural, one {una hora} other {${time} horas}}`),
    ];
    write('family.es.xlf', xliff(spanish, 'es'));
    expect(check(['es'])).toEqual({ status: 0, faults: '' });
  });
});
