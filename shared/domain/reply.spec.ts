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
  ])('%j is the digit %i', (text, digit) => {
    expect(parseReply(text)).toEqual({ kind: 'digit', digit });
  });

  // Communication facts 8.3, S15, and 4.1 for other languages.
  it.each([
    ...['STOP', 'stop', ' Stop. ', 'quit', 'End', 'revoke', 'opt out', 'Opt-Out', 'OPTOUT'],
    ...['cancel', 'unsubscribe', 'STOPALL', 'Alto', 'PARAR', 'توقف', 'ይቁም', 'Dừng', '停止'],
    ...['tigil', 'SISPANN', 'jooji', 'Du\u031b\u0300ng'],
  ])('%j opts out', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'opt-out' });
  });

  it.each(['START', 'unstop', 'Yes'])('%j opts in', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'opt-in' });
  });

  it.each(['HELP', 'help!', 'Info'])('%j asks for help', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'help' });
  });

  it.each([
    ...['', ' ', '.', '0', '4', '٤', '11', '1 2', '1 and 2', '1 or 2?', '12', 'one'],
    ...['stop time?', 'can we stop by at 7', 'she ate at 3', 'do not cancel', '፬', '👍', '³'],
  ])('%j goes to a person', (text) => {
    expect(parseReply(text)).toEqual({ kind: 'unclear' });
  });
});
