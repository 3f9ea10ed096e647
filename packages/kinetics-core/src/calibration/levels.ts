/** Standards closer than this part of the widest concentration are one level: what unit conversion leaves. */
const SAME_LEVEL = 1e-9;

/** Indices of the points of each level, from the lowest level up. */
export function levelsOf(concentrations: readonly number[]): readonly (readonly number[])[] {
  const order = concentrations.map((_, i) => i);
  order.sort((a, b) => (concentrations[a] ?? 0) - (concentrations[b] ?? 0));
  const width = concentrations.reduce((widest, value) => Math.max(widest, Math.abs(value)), 0);
  const levels: number[][] = [];
  let last = Number.NEGATIVE_INFINITY;
  for (const i of order) {
    const value = concentrations[i] ?? 0;
    const level = levels.at(-1);
    if (level !== undefined && value - last <= SAME_LEVEL * width) level.push(i);
    else levels.push([i]);
    last = value;
  }
  return levels;
}
