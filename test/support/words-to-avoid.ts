import type { LanguageId } from '../../shared/languages/languages';

/** What a text must not say, by language: whole words, in any case. */
export interface WordsToAvoid {
  /** Whatever names a disease, a test or a result: never outside of sign-in. */
  readonly medical: readonly string[];
  /** What a listener could take for a command that switches texts off or on. */
  readonly commands: readonly string[];
  /** Days and hours that mean something else when they are read later, and the two that are misread. */
  readonly relative: readonly string[];
}

const english: WordsToAvoid = {
  medical: [
    ...['tb', 'tuberculosis', 'culture', 'aspirates?', 'tubes?', 'specimens?', 'sputum', 'tests?'],
    ...['results?', 'germs?', 'laboratory', 'stomach', 'positive', 'negative', 'medicines?'],
    ...['isoniazid', 'rifampicin'],
  ],
  commands: ['stop', 'quit', 'end', 'cancel', 'revoke', 'unsubscribe', 'opt[ -]?out', 'yes'],
  relative: ['today', 'tonight', 'tomorrow', 'yesterday', 'midnight', 'noon'],
};

const spanish: WordsToAvoid = {
  medical: [
    ...['tb', 'tuberculosis', 'cultivos?', 'aspirados?', 'sondas?', 'tubos?', 'muestras?'],
    ...['esputo', 'pruebas?', 'examen', 'exámenes', 'análisis', 'resultados?', 'gérmenes'],
    ...['germen', 'bacterias?', 'laboratorios?', 'estómago', 'positiv[oa]s?', 'negativ[oa]s?'],
    ...['medicinas?', 'medicamentos?', 'isoniacida', 'rifampicina'],
  ],
  commands: ['alto', 'parar', 'pare', 'cancel(?:ar|e)', 'fin', 'baja', 'inicio'],
  // "La mañana" is the morning; alone the word is the day after.
  relative: [
    ...['hoy', 'ayer', 'medianoche', 'mediodía', 'esta (?:noche|mañana|tarde)'],
    ...['(?<!(?:de|por|en) la )mañana'],
  ],
};

/** Arabic writes "and", "with", "for" and the article as one with the word, and "your" behind it. */
const joined = (...stems: string[]): string[] =>
  stems.map((stem) => `(?:[وف]?[بلك]?(?:ال|لل)?)${stem}(?:ه|ها|هم|كم|نا|ات|ين|ان)?`);

const arabic: WordsToAvoid = {
  medical: joined(
    ...['سل', 'درن', 'تدرن', 'مزرعة', 'مزارع', 'شفط', 'أنبوب', 'أنابيب', 'عينة', 'عين', 'بلغم'],
    ...['فحص', 'فحوص', 'اختبار', 'تحليل', 'تحاليل', 'نتيجة', 'نتائج', 'جرثومة', 'جراثيم'],
    ...['بكتيريا', 'مختبر', 'معدة', 'إيجابي', 'إيجابية', 'سلبي', 'سلبية', 'دواء', 'أدوية'],
    ...['إيزونيازيد', 'ريفامبيسين'],
  ),
  // "توقف" switches texts off like "stop" (shared/domain/reply.ts).
  commands: [
    ...['توقف', 'توقفوا', 'أوقف', 'أوقفوا', 'إيقاف', 'إلغاء', 'ألغ', 'ألغوا', 'إنهاء', 'انتهى'],
    ...['نعم', 'ابدأ', 'ابدؤوا'],
  ],
  // "ذلك اليوم" and "تلك الليلة" are the day and the night that were named; alone they are today and tonight.
  relative: [
    ...['(?<!ذلك )اليوم', '(?<!تلك )الليلة', 'غدًا', 'غدا', 'أمس', 'البارحة', 'منتصف الليل'],
    ...['الظهر', 'هذا (?:الصباح|المساء)'],
  ],
};

const byLanguage: Readonly<Partial<Record<LanguageId, WordsToAvoid>>> = {
  en: english,
  es: spanish,
  ar: arabic,
};

/** Whatever the language, texts may hold English commands only where the law wants them. */
export function toAvoid(language: LanguageId, kind: keyof WordsToAvoid): RegExp {
  const own = byLanguage[language];
  if (!own) throw new RangeError(`No words to avoid are known in this language: ${language}`);
  const always = kind === 'relative' ? ['12:00'] : english[kind];
  const words = [...own[kind], ...always].join('|');
  // \b knows no letters but English ones.
  return new RegExp(`(?<![\\p{L}\\p{M}\\p{N}])(?:${words})(?![\\p{L}\\p{M}\\p{N}])`, 'iu');
}
