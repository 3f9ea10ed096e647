import { studentTFactor } from "kinetics-core/distributions";
import type { ProfileInterval } from "kinetics-core/inference";
import { numberInWords, superscript } from "kinetics-core/quantities";
import type { EquationParameter, RateEquation } from "kinetics-core/rate-equation";
import { bestFitOnRates, type RateFit } from "./best-fit-on-rates";
import type { ExtensionFact } from "./candidate";
import { INTERVAL_LEVEL } from "./constants";
import type { CandidateRun } from "./rate-problem";

/**
 * Do the runs need what a law adds to a simpler one? t = √((RSS_null − RSS)/s²) is the root of the profile at the null,
 * so t ≤ t(95 %, m − p) says that the profile interval of the added term contains it, at ∞ as well as at 0. All
 * parameters of a law fitted to rates are determined by differences between runs, r = p.
 */
export function extensionFacts(
  equation: RateEquation,
  runs: readonly CandidateRun[],
  fit: RateFit,
  profiles: readonly (ProfileInterval | null)[],
): readonly ExtensionFact[] {
  const { theta } = fit;
  const freedom = runs.length - theta.length - 1;
  if (freedom < 1) return [];
  const factor = studentTFactor(INTERVAL_LEVEL, freedom);
  return equation.simpler.flatMap(({ parameter, at, equation: simpler }): readonly ExtensionFact[] => {
    const definition = equation.parameters[parameter];
    const without = bestFitOnRates(simpler, runs);
    if (definition === undefined || "message" in without) return [];
    const rise = Math.max(0, without.runSquares - fit.runSquares);
    const tStatistic = Math.sqrt((rise * freedom) / fit.runSquares);
    const coversNull = tStatistic <= factor;
    const profile = profiles[parameter] ?? null;
    return [
      {
        law: simpler.law,
        parameter: definition.name,
        at,
        tStatistic,
        degreesOfFreedom: freedom,
        coversNull,
        excludes: coversNull && profile !== null ? excluded(profile, definition, theta, at) : null,
      },
    ];
  });
}

/** "K below 0.2 mol L⁻¹". */
function excluded(
  { lower, upper }: ProfileInterval,
  definition: EquationParameter,
  theta: ArrayLike<number>,
  at: number,
): string | null {
  const { name, kind } = definition;
  const unit = unitInWords(definition, theta);
  const below = lower === null ? null : `${name} below ${numberInWords(lower)}${unit}`;
  const above = upper === null ? null : `${name} above ${numberInWords(upper)}${unit}`;
  if (at === Number.POSITIVE_INFINITY) return below;
  if (kind === "constant") return above;
  return [below, above].filter((one) => one !== null).join(" and ") || null;
}

/** Concentrations are in mol L⁻¹ here. */
function unitInWords({ kind, concentrationPower }: EquationParameter, theta: ArrayLike<number>): string {
  if (kind === "order") return "";
  const power = concentrationPower?.(theta) ?? null;
  if (power === null) return " (concentrations in mol L⁻¹)";
  if (power === 0) return "";
  if (power === 1) return " mol L⁻¹";
  if (power === -1) return " L mol⁻¹";
  return Number.isInteger(power) ? ` (mol L⁻¹)${superscript(power)}` : ` (mol L⁻¹)^${numberInWords(power)}`;
}
