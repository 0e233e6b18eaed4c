const heads = ['What', 'Measured', 'Compared with', 'Ratio', 'At most', ''];

/** One table of all benches, as text for a terminal. */
export function tableOf(benches) {
  const lines = benches.flatMap(({ name, rows }) => [
    [name, '', '', '', '', ''],
    ...rows.map(({ what, value, of, ratio, limit }) => [
      `  ${what}`,
      value,
      of,
      ratio.toFixed(2),
      limit === undefined ? '' : limit.toFixed(2),
      limit === undefined || ratio <= limit ? '' : 'too much',
    ]),
  ]);
  const all = [heads, ...lines];
  const widths = heads.map((_, column) => Math.max(...all.map((line) => line[column].length)));
  return all
    .map((line) => line.map((cell, column) => cell.padEnd(widths[column])).join('  '))
    .map((line) => `  ${line.trimEnd()}\n`)
    .join('');
}

export const medianOf = (numbers) => {
  const sorted = [...numbers].sort((left, right) => left - right);
  const middle = Math.floor(sorted.length / 2);
  return sorted.length % 2 === 1 ? sorted[middle] : (sorted[middle - 1] + sorted[middle]) / 2;
};
