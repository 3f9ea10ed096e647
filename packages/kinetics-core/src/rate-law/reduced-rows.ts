/**
 * Reduced row echelon form by Gauss-Jordan with row pivoting: the same space as the rows given, written so that a
 * reader sees few coefficients, each row led by a 1. Entries below 1e-7 of the greatest are rounding and become 0.
 */
export function reducedRows(rows: readonly (readonly number[])[]): readonly (readonly number[])[] {
  const work = rows.map((row) => [...row]);
  const width = work[0]?.length ?? 0;
  const negligible = 1e-7 * Math.max(0, ...work.flat().map(Math.abs));
  let done = 0;
  for (let column = 0; column < width && done < work.length; column++) {
    let pivot = done;
    for (let i = done; i < work.length; i++)
      if (Math.abs(work[i]?.[column] ?? 0) > Math.abs(work[pivot]?.[column] ?? 0)) pivot = i;
    const leader = work[pivot];
    const lead = leader?.[column] ?? 0;
    if (leader === undefined || Math.abs(lead) <= negligible) continue;
    work[pivot] = work[done] ?? [];
    const scaled = leader.map((value) => value / lead);
    work[done] = scaled;
    for (let i = 0; i < work.length; i++) {
      if (i === done) continue;
      const factor = work[i]?.[column] ?? 0;
      work[i] = (work[i] ?? []).map((value, j) => value - factor * (scaled[j] ?? 0));
    }
    done += 1;
  }
  return work.slice(0, done).map((row) => {
    const greatest = Math.max(0, ...row.map(Math.abs));
    return row.map((value) => (Math.abs(value) <= 1e-7 * greatest ? 0 : value));
  });
}
