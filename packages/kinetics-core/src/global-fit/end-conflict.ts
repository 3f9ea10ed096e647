import type { Flag } from "kinetics-core/quantities";
import { fitGlobal } from "./fit-global";
import type { GlobalFit, GlobalFitInput, GlobalFitResult } from "./global-fit";

/**
 * Whether the stated end signals go with the traces. The same law is fitted with every end left free, and each parameter
 * compared: under the stated ends the first fit is the more precise one, so that the two differ by a variance that is the
 * difference of theirs (J. A. Hausman, Econometrica 46 (1978) 1251),
 *
 *   z = (b_free − b_stated)/√(u²_free − u²_stated).
 *
 * An end reading that is off by several of its stated uncertainties moves every order and ln k by far more than their own
 * errors, and nothing else of the fit shows it: the offsets of the runs take the rest.
 */
export type EndConflict =
  /** `z` of the parameter that moves most. */
  | {
      readonly status: "compared";
      readonly z: number;
      readonly name: string;
      readonly flags: readonly Flag[];
    }
  /** No end is stated, or the law is not determined without them. */
  | { readonly status: "nothing-to-compare"; readonly flags: readonly Flag[] };

/** A conflict weakens from 2 on and blocks claims of order from 3 on, as that of one trace does. */
const WEAKENS = 2;
const BLOCKS = 3;
/** Below this part of the variance the difference of the two is rounding. */
const LEAST_GAIN = 1e-3;

/** The fit with what the comparison of its ends adds to its flags. */
export function fitGlobalAndCompareEnds(input: GlobalFitInput): GlobalFitResult {
  const fit = fitGlobal(input);
  return fit.status === "fitted" ? { ...fit, flags: [...fit.flags, ...endConflict(input, fit).flags] } : fit;
}

/** Costs one more fit; none where no run states its end. */
export function endConflict(input: GlobalFitInput, fit: GlobalFit): EndConflict {
  const nothing: EndConflict = { status: "nothing-to-compare", flags: [] };
  if (!input.runs.some((run) => run.endSignal !== undefined)) return nothing;
  const free = fitGlobal({ ...input, runs: input.runs.map(({ endSignal: _, ...run }) => run) });
  if (free.status !== "fitted") return nothing;
  let worst: { z: number; name: string } | null = null;
  for (const [name, stated, open] of [
    ["ln k", fit.logRateConstant, free.logRateConstant] as const,
    ...Object.entries(fit.parameters).map(([name, one]) => [name, one, free.parameters[name]] as const),
  ]) {
    if (stated.estimate === null || stated.standardError === null) continue;
    if (open === undefined || open.estimate === null || open.standardError === null) continue;
    const gained = open.standardError ** 2 - stated.standardError ** 2;
    // A misfit swells the error under the stated ends too. V_free is the most that the difference can vary by.
    const variance = gained > LEAST_GAIN * open.standardError ** 2 ? gained : open.standardError ** 2;
    const z = Math.abs(open.estimate - stated.estimate) / Math.sqrt(variance);
    if (worst === null || z > worst.z) worst = { z, name };
  }
  if (worst === null) return nothing;
  const { z, name } = worst;
  const isOrder = Object.hasOwn(fit.orders, name);
  const flags: Flag[] =
    z <= WEAKENS
      ? []
      : [
          {
            code: "end-conflict",
            severity: z > BLOCKS ? "blocks" : "weakens",
            message: `The traces disagree with their stated end signals: with free ends ${isOrder ? `the order in ${name}` : name} would differ by ${z.toFixed(1)} standard uncertainties. A blank is not the end signal where the product absorbs; measure the ends, or leave them free.`,
          },
        ];
  return { status: "compared", z, name, flags };
}
