import type { RateLawInput } from "kinetics-core/rate-law";

/** Above any of these a fit may take tenths of a second, and with hundreds of blocks hours. */
const QUICK = { concentrations: 400, blocks: 12, shared: 12 } as const;

/**
 * Whether a law is fitted in the time of a page. The search for two variances solves a system of every shared error
 * and every block some hundred times; a run without a block is a block of its own where others have one.
 */
export function isQuickFit({ species, runs, shared = [] }: RateLawInput): boolean {
  const named = new Set(runs.flatMap((run) => (run.block === undefined ? [] : [run.block])));
  const alone = named.size === 0 ? 0 : runs.filter((run) => run.block === undefined).length;
  return (
    runs.length * species.length <= QUICK.concentrations &&
    named.size + alone <= QUICK.blocks &&
    shared.length <= QUICK.shared
  );
}
