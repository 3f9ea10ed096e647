import { numberInWords } from "kinetics-core/quantities";
import type { RateLawInput } from "./rate-law";
import { heldOrders, type UsableRun } from "./usable-runs";

/**
 * Sizes that a law can be computed from: weights are squares of ratios of squares, and a double ends at 1e308. In a
 * litre of 1e-30 mol/L there is not one molecule, in any unit that is typed.
 */
const SMALLEST = 1e-30;
const LARGEST = 1e30;
/** A relative uncertainty beyond says nothing that this one does not. */
const LARGEST_RELATIVE = 1e6;
/** Orders of real laws end at a few. */
const LARGEST_ORDER = 20;

/** The first number that is out of range, as a sentence with its place, or null. */
export function refusedSize(input: RateLawInput, runs: readonly UsableRun[]): string | null {
  const held = heldOrders(input);
  const order = held.findIndex((one) => one !== null && Math.abs(one) > LARGEST_ORDER);
  if (order >= 0)
    return `The order of ${input.species[order] ?? ""} is held at ${numberInWords(held[order] ?? 0)}; orders from −${LARGEST_ORDER} to ${LARGEST_ORDER} can be held.`;
  const shared = (input.shared ?? []).find(
    (one) => Number.isFinite(one.relative) && one.relative > LARGEST_RELATIVE,
  );
  if (shared !== undefined)
    return `A shared error has the relative uncertainty ${numberInWords(shared.relative)}; up to ${numberInWords(LARGEST_RELATIVE)} is computed with. Look for a wrong power of ten.`;
  for (const run of runs) {
    const found = outOfRange(run, input.species, held);
    if (found !== null) return found;
  }
  return null;
}

function outOfRange(
  run: UsableRun,
  species: readonly string[],
  held: readonly (number | null)[],
): string | null {
  const sizes: readonly (readonly [string, number])[] = [
    ["rate", Math.abs(run.rate)],
    ["standard error of the rate", run.rateError],
    ...species.flatMap((name, i) =>
      held[i] === 0 ? [] : [[`concentration of ${name}`, run.concentrations[i] ?? 0] as const],
    ),
  ];
  const wrong = sizes.find(([, size]) => size !== 0 && !(size >= SMALLEST && size <= LARGEST));
  if (wrong !== undefined)
    return `The ${wrong[0]} of ${run.label} is ${numberInWords(wrong[1])}; sizes from ${numberInWords(SMALLEST)} to ${numberInWords(LARGEST)} are computed with. Look for a wrong power of ten or a wrong unit.`;
  const uncertain = run.privateErrors.findIndex((error) => error > LARGEST_RELATIVE);
  if (uncertain < 0) return null;
  return `The relative uncertainty of ${species[uncertain] ?? ""} in ${run.label} is ${numberInWords(run.privateErrors[uncertain] ?? 0)}; up to ${numberInWords(LARGEST_RELATIVE)} is computed with. Look for a wrong power of ten.`;
}
