import { IntlMessageFormat } from 'intl-messageformat';
import { shippedWords } from '../../server/wording/shipped-words';
import { wordingFrom, type Wording } from '../../server/wording/render';

type Elements = ReturnType<IntlMessageFormat['getAst']>;
/** Kinds of element in a parsed text, as the parser numbers them. */
const kinds = { argument: 1, number: 2, select: 5, plural: 6 } as const;

/** Parameters of a text, with the kind of value each takes. */
export function parametersOf(body: string): Map<string, 'words' | 'number'> {
  const found = new Map<string, 'words' | 'number'>();
  const walk = (elements: Elements): void => {
    for (const element of elements) {
      const kind: number = element.type;
      if (kind === kinds.argument && 'value' in element) found.set(element.value, 'words');
      if ((kind === kinds.plural || kind === kinds.number) && 'value' in element)
        found.set(element.value, 'number');
      if ((kind === kinds.plural || kind === kinds.select) && 'options' in element)
        for (const option of Object.values(element.options)) walk(option.value);
    }
  };
  walk(new IntlMessageFormat(body, 'en', undefined, { ignoreTag: true }).getAst());
  return found;
}

/** Sample values in the shapes that the server hands in: no value is a name where texts take a family label. */
const samples: Readonly<Record<string, string>> = {
  address: '18 Harbor Street',
  clinic: 'Harbor Street',
  code: '123456',
  date: '9 December',
  dayText: 'Wednesday, 9 December',
  day: 'Wednesday, 9 December',
  door: 'Door B',
  emergency: '911',
  from: 'Tuesday',
  label: 'Baby',
  phone: '206-555-0142',
  time: '7:00 in the morning',
  to: 'Wednesday',
  url: 'https://visits.example.org/m/AbCdEfGhIjKlMnOpQrStUv',
  weekday: 'Wednesday',
};

export function sampleParams(body: string, counts = 2): Record<string, string | number> {
  return Object.fromEntries(
    [...parametersOf(body)].map(([name, kind]) => [
      name,
      kind === 'number' ? counts : (samples[name] ?? `<${name}>`),
    ]),
  );
}

/** The shipped English words without a database. */
export function englishWording({ isSignedOff = true } = {}): Wording {
  const words = Object.entries(shippedWords('en'));
  return wordingFrom(
    'en',
    new Map(words.map(([key, body]) => [key, { key, body, version: 1, isSignedOff }])),
  );
}

export { shippedWords };
