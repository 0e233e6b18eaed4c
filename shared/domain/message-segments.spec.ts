import { SegmentedMessage } from 'sms-segments-calculator';
import { inShortAlphabet, messageSegments } from './message-segments';

const a = (count: number): string => 'a'.repeat(count);
const ha = (count: number): string => 'ሀ'.repeat(count);
const face = (count: number): string => '😀'.repeat(count);

describe('parts of a text', () => {
  // Communication facts 8.3, S1 to S13.
  it.each<[string, string, string, number, number]>([
    ['S1', a(160), 'gsm-7', 160, 1],
    ['S1', a(161), 'gsm-7', 161, 2],
    ['S2', a(306), 'gsm-7', 306, 2],
    ['S2', a(307), 'gsm-7', 307, 3],
    ['S2', a(459), 'gsm-7', 459, 3],
    ['S2', a(460), 'gsm-7', 460, 4],
    ['S3', '€'.repeat(80), 'gsm-7', 160, 1],
    ['S3', '€'.repeat(81), 'gsm-7', 162, 2],
    ['S4', `${a(158)}€`, 'gsm-7', 160, 1],
    ['S4', `${a(159)}€`, 'gsm-7', 161, 2],
    ['S5', `${a(152)}€${a(151)}`, 'gsm-7', 305, 2],
    ['S5', `${a(152)}€${a(152)}`, 'gsm-7', 306, 3],
    ['S6', ha(70), 'ucs-2', 70, 1],
    ['S6', ha(71), 'ucs-2', 71, 2],
    ['S6', ha(134), 'ucs-2', 134, 2],
    ['S6', ha(135), 'ucs-2', 135, 3],
    ['S6', ha(201), 'ucs-2', 201, 3],
    ['S6', ha(202), 'ucs-2', 202, 4],
    ['S7', face(35), 'ucs-2', 70, 1],
    ['S7', face(36), 'ucs-2', 72, 2],
    ['S7', face(66), 'ucs-2', 132, 2],
    ['S7', face(67), 'ucs-2', 134, 3],
    ['S8', `${ha(66)}😀${ha(65)}`, 'ucs-2', 133, 2],
    ['S8', `${ha(66)}😀${ha(66)}`, 'ucs-2', 134, 3],
    ['S11', '[x]', 'gsm-7', 5, 1],
    ['S11', '~', 'gsm-7', 2, 1],
    [
      'S12',
      'Mañana: su niño NO debe comer ni beber. Llegue a las 6:30. ¿Preguntas? Llame.',
      'gsm-7',
      77,
      1,
    ],
    [
      'S13',
      'Mañana su niño no debe comer. Llámenos si tiene preguntas sobre la cita clínica.',
      'ucs-2',
      80,
      2,
    ],
  ])('%s %#', (_, text, encoding, units, segments) => {
    expect(messageSegments(text)).toMatchObject({ encoding, units, segments });
  });

  it.each(['é', 'à', 'ñ', 'ü', 'Ç', '¿', '¡', '\n', '^', '|'])('S9: %j is GSM', (character) => {
    expect(messageSegments(character)).toMatchObject({ encoding: 'gsm-7', notGsm: [] });
  });

  it.each(['á', 'í', 'ó', 'ú', 'ç', '’', '—', '`', '\t', '\u00a0', '\u202f', '\u200e'])(
    'S10: %j is not',
    (character) => {
      expect(messageSegments(`${character}a${character}`)).toMatchObject({
        encoding: 'ucs-2',
        notGsm: [character],
      });
    },
  );

  it('S14: refuses a text without content', () => {
    expect(() => messageSegments('')).toThrow('without text');
  });

  // An independent implementation as the oracle, over texts drawn by a seed.
  it('agrees with another implementation', () => {
    let seed = 4_2027;
    const draw = (below: number): number => {
      seed = (Math.imul(seed, 1_664_525) + 1_013_904_223) >>> 0;
      return Math.floor((seed / 2 ** 32) * below);
    };
    const alphabets = [
      [...'abc XYZ 0189.,:?!@£$¥èéùìòÇØøÅåΔΦΓΛΩΠΨΣΘΞÆæßÉñü¿¡'],
      [...'ab€[]{}~^|\\'],
      [...'abáíóúñçñ'],
      [...'ሀለሐ ab', '😀', '🌅'],
      [...'你好，明天 06:30', '𠀀'],
    ];
    for (let round = 0; round < 600; round += 1) {
      const alphabet = alphabets[draw(alphabets.length)] ?? ['a'];
      const length = 1 + draw(round % 3 === 0 ? 480 : 180);
      const text = Array.from({ length }, () => alphabet[draw(alphabet.length)] ?? 'a').join('');
      const oracle = new SegmentedMessage(text, 'auto', false);
      expect([text, messageSegments(text).segments]).toEqual([text, oracle.segmentsCount]);
      expect(messageSegments(text).encoding === 'gsm-7').toBe(oracle.encodingName === 'GSM-7');
    }
  });
});

describe('the short alphabet', () => {
  it.each([
    ['sábado', 'sabado'],
    ['Don’t wait…', "Don't wait..."],
    ['miércoles', 'miércoles'],
    ['6:30\u202fa.m.', '6:30 a.m.'],
    ['áíóúÁÍÓÚçãõ', 'aiouAIOUÇao'],
    ['‘a’ “b” – c — d…', `'a' "b" - c - d...`],
    ['a\u00a0b\u202fc\td', 'a b c d'],
    // Another script stays as it is, its accents too.
    ['الأربعاء sábado', 'الأربعاء sábado'],
  ])('%j is written %j', (text, expected) => {
    expect(inShortAlphabet(text)).toBe(expected);
  });
});
