/** Above this, one exponential costs less than the multiplications and their rounding. */
const LARGEST_MULTIPLIED_ORDER = 3;

/** The held orders that `wholePower` takes. */
export function isMultiplied(order: number): boolean {
  return Number.isInteger(order) && order !== 0 && Math.abs(order) <= LARGEST_MULTIPLIED_ORDER;
}

/** x^order by multiplication, for x of either sign. */
export function wholePower(x: number, order: number): number {
  const size = Math.abs(order);
  const power = size === 1 ? x : size === 2 ? x * x : x * x * x;
  return order > 0 ? power : 1 / power;
}
