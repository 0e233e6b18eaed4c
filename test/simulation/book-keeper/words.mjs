// Whether a text says what it must not, and in which language it is. Small lists of its own.

const telling = [
  /\btubercul/i,
  /\bTB\b/,
  /\baspirat/i,
  /\bgastric/i,
  /\b(stomach|sputum|specimen|culture|x-?ray|laborator)/i,
  /\b(test|tests|result|results|positive|negative|disease|infection)\b/i,
  /\b(prueba|pruebas|examen|resultado|resultados|cultivo|enfermedad|muestra|laboratorio)\b/i,
  /\b(positivo|negativo|estómago|esputo|gástric)/i,
  /(السل|سلّ|تحليل|فحص|نتيجة|نتائج|مرض|عينة|مختبر|إيجابي|سلبي|معدة|بلغم)/,
];

/** What in a text must not be there: a word, a child's full name, a birth date. @returns the fault, or null. */
export function unsafeIn(text, children) {
  const plain = text.replace(/https?:\/\/\S+/g, ' ');
  for (const pattern of telling) {
    const found = pattern.exec(plain);
    if (found) return `"${found[0]}"`;
  }
  for (const { fullName, bornOn } of children) {
    if (plain.includes(fullName)) return 'a full name';
    const [year, month, day] = bornOn.split('-');
    const dates = [
      bornOn,
      `${month}/${day}/${year}`,
      `${day}/${month}/${year}`,
      `${Number(month)}/${Number(day)}/${year}`,
    ];
    if (dates.some((date) => plain.includes(date))) return 'a birth date';
  }
  return null;
}

const marks = {
  en: /\b(the|your|you|here|call|come|night|what|and|is|we|after|text|for|thank)\b/gi,
  es: /\b(el|la|los|su|sus|usted|aquí|llame|venga|noche|qué|que|de|no|gracias|para|después|con)\b/gi,
};

/** The language that a text is written in: 'ar' by its letters, else the one with more of its little words. */
export function languageOf(text) {
  const plain = text.replace(/https?:\/\/\S+/g, ' ');
  const arabic = plain.match(/[\u0600-\u06ff]/g)?.length ?? 0;
  const latin = plain.match(/[a-záéíóúñ]/gi)?.length ?? 0;
  if (arabic > latin / 2) return 'ar';
  const count = (pattern) => plain.match(pattern)?.length ?? 0;
  return count(marks.es) > count(marks.en) ? 'es' : 'en';
}
