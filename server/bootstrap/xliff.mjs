// Reads the XLIFF 2 that Angular writes: units with notes, one segment, placeholders and ICU texts.

/**
 * Units by id: `{ source, target, placeholders: { source, target } }` where a missing target is
 * undefined. Throws when the file is cut off or holds an id twice.
 */
export function readXliff(text) {
  if (!/<\/xliff>\s*$/.test(text)) throw new Error('the file is cut off: it has no end');
  const units = new Map();
  const openings = text.match(/<unit\b/g)?.length ?? 0;
  for (const [, id, body] of text.matchAll(/<unit id="([^"]*)"[^>]*>([\s\S]*?)<\/unit>/g)) {
    if (units.has(id)) throw new Error(`"${id}" appears twice`);
    units.set(id, { source: inner(body, 'source') ?? '', target: inner(body, 'target') });
  }
  if (units.size !== openings) throw new Error('a unit has no end');
  return { language: /trgLang="([^"]*)"/.exec(text)?.[1], units };
}

function inner(body, name) {
  if (new RegExp(`<${name}[^>]*/>`).test(body)) return '';
  return new RegExp(`<${name}[^>]*>([\\s\\S]*?)</${name}>`).exec(body)?.[1];
}

/** The names of all placeholders of a text, sorted: {{ values }}, elements, and nested ICU texts. */
export function placeholdersOf(text) {
  const names = [...text.matchAll(/\b(?:equiv|equivStart)="([^"]*)"/g)].map(([, name]) => name);
  return [...new Set(names)].sort();
}

/** A text without markup, for asking whether it says anything and whether two say the same. */
export function plain(text) {
  return text.replace(/\s+/g, ' ').trim();
}

/**
 * The ICU texts within a text, nested ones too:
 * `[{ variable, kind: 'plural' | 'selectordinal' | 'select', categories }]`.
 */
export function icuTextsOf(text) {
  const bare = text.replace(/<[^>]*>/g, '');
  const found = [];
  for (const match of bare.matchAll(/\{\s*([\w$]+)\s*,\s*(plural|selectordinal|select)\s*,/g)) {
    const [opening, variable, kind] = match;
    found.push({ variable, kind, categories: categoriesFrom(bare, match.index + opening.length) });
  }
  return found;
}

function categoriesFrom(text, start) {
  const categories = [];
  let name = '';
  let depth = 0;
  for (const sign of text.slice(start)) {
    if (sign === '{') {
      if (depth === 0) categories.push(name.trim());
      depth += 1;
      name = '';
    } else if (sign === '}') {
      if (depth === 0) return categories;
      depth -= 1;
    } else if (depth === 0) {
      name += sign;
    }
  }
  return categories;
}
