import type { TwicePrecise } from "./twice-precision";

/** What is wrong with the input of a linear fit, in one sentence, or null. */
export function faultOf(
  design: readonly TwicePrecise[],
  response: ArrayLike<number>,
  weights: ArrayLike<number> | undefined,
): string | null {
  if (design.length === 0) return "There is no column; a fit needs at least one.";
  const named = [
    ["response", response] as const,
    ...design.map(({ values }, j) => [`column ${j}`, values] as const),
    ...(weights === undefined ? [] : [["weights", weights] as const]),
  ];
  for (const [name, values] of named) {
    if (values.length !== response.length)
      return `${name} has ${values.length} values; the response has ${response.length}.`;
    const at = Array.from(values).findIndex((value) => !Number.isFinite(value));
    if (at >= 0) return `${name} holds ${values[at]} at place ${at}; finite numbers are accepted.`;
  }
  const light = Array.from(weights ?? []).findIndex((weight) => !(weight > 0));
  return light >= 0 ? `weights holds ${weights?.[light]} at place ${light}; weights must be above 0.` : null;
}

/** Between these sizes squares, and the inverses of squares of columns that are nearly alike, stay within a double. */
const LEAST = 1e-130;
const MOST = 1e130;

/** The same for sizes that no double can square, weights counted. A column of zeros is a matter of rank, not of size. */
export function sizeFaultOf(columns: readonly TwicePrecise[], response: TwicePrecise): string | null {
  const accepted = `between ${LEAST} and ${MOST} are accepted; use another unit.`;
  for (const [j, { values }] of columns.entries()) {
    const size = largestOf(values);
    if (size > MOST || (size > 0 && size < LEAST))
      return `column ${j} has values of up to ${size} in size, its weights included; ${accepted}`;
  }
  const size = largestOf(response.values);
  return size > MOST
    ? `response has values of up to ${size} in size, its weights included; ${accepted}`
    : null;
}

function largestOf(values: Float64Array): number {
  let largest = 0;
  for (let i = 0; i < values.length; i++) largest = Math.max(largest, Math.abs(values[i] ?? 0));
  return largest;
}
