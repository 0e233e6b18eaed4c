import { parseReply } from './reply';

describe('a reply by text', () => {
  it.each<[string, number]>([
    ['1', 1],
    [' 2 ', 2],
    ['3.', 3],
    ['"1"', 1],
    ['(2)', 2],
    ['1!', 1],
    ['1️⃣', 1],
    ['\u200f٢\u200f', 2],
    ['١', 1],
    ['۳', 3],
    ['२', 2],
    ['२।', 2],
    ['၁', 1],
    ['၃။', 3],
    ['１', 1],
    ['፩', 1],
    ['፫።', 3],
    ['二', 2],
    ['1 ok', 1],
    ['1 thank you', 1],
    ['1, nothing', 1],
    ['1 nada gracias', 1],
    ['1 لا شيء', 1],
    ['1 1', 1],
    ['1, 1.', 1],
    ['1 👍', 1],
    ['3 not coming', 3],
    ['3 no vamos a ir', 3],
    ['3 لن نأتي', 3],
    ['hello good morning, the answer is 1 thanks', 1],
    ['okay 1 please', 1],
    ['hola buenos días 1 por favor', 1],
    ['buenas dias 1', 1],
    ['1 شكرا', 1],
    ['1 شكرًا', 1],
    ['(("1', 1],
    ['1👍', 1],
  ])('%j is the digit %i', (text, digit) => {
    expect(parseReply(text)).toEqual({ kind: 'digit', digit });
  });

  // Communication facts 8.3, S15, and 4.1 for other languages.
  it.each([
    ...[
      'STOP',
      'stop',
      ' Stop. ',
      'quit',
      'End',
      'revoke',
      'opt out',
      'Opt-Out',
      'OPTOUT',
      'opt  out',
    ],
    ...['cancel', 'unsubscribe', 'STOPALL', 'Alto', 'PARAR', 'توقف', 'ይቁም', 'Dừng', '停止'],
    ...['tigil', 'SISPANN', 'jooji', 'Du\u031b\u0300ng', 'Please STOP', 'stop  texting me', 'BAJA'],
    ...['إلغاء', 'no más mensajes', "Don't text me!"],
  ])('%j opts out', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'opt-out' });
  });

  it.each(['START', 'unstop', 'Yes'])('%j opts in', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'opt-in' });
  });

  it.each<[string, string]>([
    ['2 milk', 'milk'],
    ['2. she had a bottle', 'she had a bottle'],
    ['2 leche a las cuatro', 'leche a las cuatro'],
  ])('%j is a 2 with words for a person', (text, words) => {
    expect(parseReply(text)).toEqual({ kind: 'digit', digit: 2, words });
  });

  it.each<[string, number]>([
    ['4', 4],
    ['5.', 5],
    ['9 9', 9],
    ['٩', 9],
    ['٦', 6],
    ['፬', 4],
  ])('%j chooses a child', (text, choice) => {
    expect(parseReply(text)).toEqual({ kind: 'choice', choice });
  });

  it.each(['HELP', 'help!', 'Info', 'Ayuda'])('%j asks for help', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'help' });
  });

  it.each([
    ...['', ' ', '.', '0', '11', '1 2', '1 and 2', '1 or 2?', '12', 'one', '10', '1/2'],
    ...['to opt out', 'opt out later', '2 she ate at 3', 'we said 2 milk', '2 at 3:30'],
    ...['stop time?', 'can we stop by at 7', 'she ate at 3', 'do not cancel', '👍', '³'],
    ...['1 but he had a sip', '1 maybe', '3:30', '3 am', '3 sick', '2:30', '2 30', 'at 2', '4 am'],
  ])('%j goes to a person', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'unclear' });
  });
});
