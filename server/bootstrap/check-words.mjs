// Checks the translations of the applications. Angular's own check lets empty targets, dropped
// placeholders, changed sources and missing plural forms through; where a family reads when its child
// may last eat, none of them may.
// `node server/bootstrap/check-words.mjs [folder]`
import { existsSync, readFileSync, readdirSync } from 'node:fs';
import { join, resolve } from 'node:path';
import { root } from './folders.mjs';
import { icuTextsOf, placeholdersOf, plain, readXliff } from './xliff.mjs';

// Spanish, French and Portuguese use "many" for whole millions only; the general form serves there.
const manyIsForMillions = new Set(['es', 'fr', 'pt']);

/** All faults of a checkout, each a sentence. */
export function faultsOfWords(folder) {
  const { projects } = JSON.parse(readFileSync(join(folder, 'angular.json'), 'utf8'));
  const faults = [];
  const expected = new Set();
  for (const [application, { i18n }] of Object.entries(projects)) {
    const sourceFile = `locales/ui/${application}.xlf`;
    expected.add(sourceFile);
    const source = read(folder, sourceFile, faults);
    for (const [language, { translation }] of Object.entries(i18n?.locales ?? {})) {
      expected.add(translation);
      const translated = read(folder, translation, faults);
      if (source && translated) {
        faults.push(
          ...faultsOfTranslation(source, translated, language).map(
            (fault) => `${translation}: ${fault}`,
          ),
        );
      }
    }
  }
  const folderOfWords = join(folder, 'locales', 'ui');
  const present = existsSync(folderOfWords) ? readdirSync(folderOfWords) : [];
  for (const name of present.filter((file) => file.endsWith('.xlf')).sort()) {
    if (!expected.has(`locales/ui/${name}`)) {
      faults.push(`locales/ui/${name}: no application is built from it`);
    }
  }
  return faults;
}

function read(folder, file, faults) {
  try {
    return readXliff(readFileSync(join(folder, file), 'utf8'));
  } catch (error) {
    faults.push(`${file}: ${error.code === 'ENOENT' ? 'the file is missing' : error.message}`);
    return undefined;
  }
}

function faultsOfTranslation(source, translated, language) {
  const faults = [];
  if (translated.language !== language) {
    faults.push(`trgLang is "${translated.language ?? ''}", not "${language}"`);
  }
  for (const id of translated.units.keys()) {
    if (!source.units.has(id)) faults.push(`"${id}" is left over: the application does not say it`);
  }
  for (const [id, { source: original }] of source.units) {
    const unit = translated.units.get(id);
    if (!unit) faults.push(`"${id}" is missing`);
    else faults.push(...faultsOfUnit(original, unit, language).map((fault) => `"${id}" ${fault}`));
  }
  return faults;
}

function faultsOfUnit(original, { source, target }, language) {
  if (plain(source) !== plain(original)) {
    return ['was translated from another English text: translate it again'];
  }
  if (target === undefined || plain(target.replace(/<[^>]*>/g, '')) === '') {
    if (plain(original.replace(/<[^>]*>/g, '')) !== '') return ['has no translation'];
  }
  const faults = [];
  const [wanted, got] = [placeholdersOf(original), placeholdersOf(target ?? '')];
  for (const name of wanted.filter((one) => !got.includes(one))) faults.push(`lost {${name}}`);
  for (const name of got.filter((one) => !wanted.includes(one))) faults.push(`invented {${name}}`);
  return [...faults, ...faultsOfIcu(icuTextsOf(original), icuTextsOf(target ?? ''), language)];
}

function faultsOfIcu(originals, targets, language) {
  // A plural within a plural stands once for each form of the outer one, so that languages with more
  // forms repeat it more often: what must agree is what is counted, and how.
  if (countedIn(originals) !== countedIn(targets)) return ['has other plural or select texts'];
  return targets.flatMap(({ variable, kind, categories }) => {
    const wanted =
      kind === 'select'
        ? originals.find((one) => one.variable === variable).categories
        : pluralCategories(language, kind);
    return wanted
      .filter((category) => !categories.includes(category))
      .map((category) => `has no form for "${category}"`);
  });
}

function countedIn(icuTexts) {
  return [...new Set(icuTexts.map(({ variable, kind }) => `${variable} ${kind}`))].sort().join();
}

function pluralCategories(language, kind) {
  const type = kind === 'plural' ? 'cardinal' : 'ordinal';
  const { pluralCategories: all } = new Intl.PluralRules(language, { type }).resolvedOptions();
  const forMillions = manyIsForMillions.has(language.split('-')[0]);
  return all.filter((category) => !(forMillions && category === 'many'));
}

const faults = faultsOfWords(process.argv[2] ? resolve(process.argv[2]) : root);
for (const fault of faults) process.stderr.write(`${fault}\n`);
process.stdout.write(
  faults.length === 0 ? 'The translations are whole.\n' : `${faults.length} faults in the words.\n`,
);
process.exitCode = faults.length === 0 ? 0 : 1;
