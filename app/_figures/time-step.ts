/** A power of ten that is a tenth of the distance between readings, or a little less. */
export function timeStep(time: readonly number[]): number {
  const span = (time.at(-1) ?? 0) - (time[0] ?? 0);
  const distance = span / Math.max(1, time.length - 1);
  return distance > 0 ? 10 ** Math.floor(Math.log10(distance / 10) + 1e-9) : 1;
}

/** Where a key leads: arrows one step, with Shift ten; null for other keys. */
export function timeOfKey(key: string, shift: boolean, at: number, step: number): number | null {
  const way = shift ? 10 * step : step;
  if (key === "ArrowLeft" || key === "ArrowDown") return at - way;
  if (key === "ArrowRight" || key === "ArrowUp") return at + way;
  return null;
}
