/**
 * Thins a trace for a drawing `columns` pixels wide: of every column the first, lowest, highest and last reading
 * stay, in their order, so that nothing visible is lost. Short traces come back whole. `x` strictly increasing.
 */
export function decimate(
  x: readonly number[],
  y: readonly number[],
  columns: number,
): { readonly x: readonly number[]; readonly y: readonly number[] } {
  const length = Math.min(x.length, y.length);
  if (length <= columns * 4) return { x, y };
  const start = x[0] ?? 0;
  const perColumn = ((x[length - 1] ?? start) - start) / columns;
  const kept: number[] = [];
  let column = { index: 0, first: 0, lowest: 0, highest: 0, last: 0 };
  const at = (index: number) => y[index] ?? 0;
  for (let i = 1; i <= length; i += 1) {
    const index = Math.min(columns - 1, Math.floor(((x[i] ?? Number.POSITIVE_INFINITY) - start) / perColumn));
    if (i < length && index === column.index) {
      if (at(i) < at(column.lowest)) column.lowest = i;
      if (at(i) > at(column.highest)) column.highest = i;
      column.last = i;
    } else {
      const chosen = new Set([column.first, column.lowest, column.highest, column.last]);
      kept.push(...[...chosen].sort((a, b) => a - b));
      column = { index, first: i, lowest: i, highest: i, last: i };
    }
  }
  return { x: kept.map((i) => x[i] ?? 0), y: kept.map(at) };
}
