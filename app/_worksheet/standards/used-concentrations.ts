import { evaluateCurve } from "kinetics-core/initial-rate";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { RunAnalysis } from "../analysis";

/** Places along a window at which its signal is looked at; the fitted curve is smooth between them. */
const PLACES = 20;

/**
 * Concentrations, mol L⁻¹, at which the line is used: where the fitted curves of the standing runs lie within their windows,
 * read back by the line. Empty while no run has a rate from a trace.
 */
export function usedConcentrations(
  sheet: Sheet,
  runs: readonly RunAnalysis[],
  line: { readonly intercept: number; readonly slope: number },
): readonly number[] {
  if (line.slope === 0) return [];
  const timeZero = new Map(sheet.runs.map((run) => [run.id, run.timeZeroSeconds]));
  return runs.flatMap(({ runId, state, rate }) => {
    if (state !== "standing" || rate.kind !== "estimated") return [];
    const { window, curve } = rate.initialRate;
    const [from, to] = window;
    const zero = timeZero.get(runId) ?? 0;
    return Array.from({ length: PLACES + 1 }, (_, place) => {
      const seconds = from + ((to - from) * place) / PLACES;
      return (evaluateCurve(curve, seconds - zero) - line.intercept) / line.slope;
    });
  });
}
