import { studentTFactor } from "kinetics-core/distributions";
import { type Flag, inARow, numberInWords, percent } from "kinetics-core/quantities";
import type { CalibrationLine } from "./calibration";
import { testCurvature } from "./curvature";

/**
 * The linear range by a bound on what curvature may do, not by a test that did not find it: 5 % curvature with 1 %
 * scatter and six standards passes a 5 % test in 86 of 100 cases, and six straight standards with 1 % scatter show
 * straightness for an eighth to a tenth of the range only (medians of 20,000 simulated lines, with and without a blank).
 *
 * With signal = α + β c + q c² the curved part at a concentration c is q c², against the net signal S = b c of the line.
 * Its size relative to S, |q| c/b, grows in proportion to c, and with u(q) and Student's t (two-sided 95 %, ν of the
 * parabola) the data admit
 *
 *   at least  (|q| − t u) c/b     and     at most  (|q| + t u) c/b.
 *
 * Where the least exceeds 2 % curvature is shown; up to where the most is 2 % straightness is shown; between the two the
 * standards cannot say. Both ends are therefore concentrations, 0.02 b/(|q| ± t u).
 *
 * **How many more standards would show straightness up to the highest one?** N standards on the present levels have
 * u_N = u √(n/N) and ν_N = N − 3. Taking the true |q| as the least that the data admit, q₀ = max(0, |q| − t u), the new
 * |q| stays below q₀ + z u_N with 80 % or more where z = 1.282, so N is the least number with (q₀ + (z + t_N) u_N) c_max/b ≤ 2 %.
 * The same condition with n and a smaller scatter gives the factor by which the scatter would have to fall.
 */
export type LinearRange =
  | {
      readonly status: "assessed";
      /** Largest size of a concentration up to which straightness is shown; at most that of the highest standard. */
      readonly straightUpTo: number;
      /** Size of a concentration from which curvature is shown; null where it is not within the standards. */
      readonly curvedFrom: number | null;
      /** Size of the highest standard's concentration. */
      readonly highest: number;
      /** Least and greatest curved part, relative to the net signal, per unit of concentration. */
      readonly leastPerConcentration: number;
      readonly mostPerConcentration: number;
      /** As above; null where straightness or curvature is shown, or where it takes more than 10 000. */
      readonly moreStandards: number | null;
      /** The scatter that would show it with the present standards, relative to the present scatter; null as above. */
      readonly scatterNeeded: number | null;
    }
  | { readonly status: "not-assessed"; readonly message: string };

export type Straightness = "straight" | "not-shown" | "curved";

/** Curved part of the net signal that a calibration line may carry unnoticed: rate and concentration err by as much. */
const LARGEST_CURVED_PART = 0.02;
const LEVEL = 0.95;
/** Share of used points beyond the range above which the line is not fit for them. */
const LARGEST_SHARE_BEYOND = 0.2;
const MOST_STANDARDS = 10_000;
/** 80 % of standard normal deviates are smaller in size: a plan that works four times in five. */
const DEVIATE_OF_PLAN = 1.2816;

export function linearRange(line: CalibrationLine): LinearRange {
  const curvature = testCurvature(line);
  const slope = Math.abs(line.slope.estimate ?? 0);
  const highest = line.standards.reduce((widest, one) => Math.max(widest, Math.abs(one.concentration)), 0);
  if (curvature.status === "too-few-standards") {
    return { status: "not-assessed", message: curvature.message };
  }
  if (slope === 0) {
    return {
      status: "not-assessed",
      message: "The line is level, so there is no net signal to compare with.",
    };
  }
  const [size, error, freedom] =
    curvature.status === "exact"
      ? [0, 0, Number.POSITIVE_INFINITY]
      : [
          Math.abs(curvature.quadratic.estimate ?? 0),
          curvature.quadratic.standardError ?? 0,
          curvature.degreesOfFreedom[1],
        ];
  const halfWidth = studentTFactor(LEVEL, freedom) * error;
  const least = Math.max(0, size - halfWidth) / slope;
  const most = (size + halfWidth) / slope;
  const curvedFrom = least * highest > LARGEST_CURVED_PART ? LARGEST_CURVED_PART / least : null;
  const shown = most * highest <= LARGEST_CURVED_PART;
  const room = (LARGEST_CURVED_PART / highest) * slope - least * slope;
  const open = !shown && curvedFrom === null && room > 0;
  return {
    status: "assessed",
    straightUpTo: shown ? highest : LARGEST_CURVED_PART / most,
    curvedFrom,
    highest,
    leastPerConcentration: least,
    mostPerConcentration: most,
    moreStandards: open ? moreStandards(error, room, line.standards.length, freedom) : null,
    scatterNeeded: open ? room / ((studentTFactor(LEVEL, freedom) + DEVIATE_OF_PLAN) * error) : null,
  };
}

/** What the standards show about one concentration. */
export function straightnessAt(range: LinearRange, concentration: number): Straightness {
  if (range.status === "not-assessed") return "not-shown";
  const size = Math.abs(concentration);
  if (range.leastPerConcentration * size > LARGEST_CURVED_PART) return "curved";
  // Rounding must not take the highest standard out of a range that ends at it.
  return range.mostPerConcentration * size <= LARGEST_CURVED_PART * (1 + 1e-12) ? "straight" : "not-shown";
}

/**
 * Findings for the points that a line is used at: its own standards, the readings of a trace.
 *
 * @param points what they are in a sentence, such as "standards".
 * @param keepUpTo highest standard of a line that shows no curvature (`partWithoutCurvature`); null where unknown.
 */
export function linearRangeFlags(
  range: LinearRange,
  concentrations: readonly number[],
  points: string,
  keepUpTo: number | null = null,
): readonly Flag[] {
  if (concentrations.length === 0) return [];
  if (range.status === "not-assessed")
    return [
      {
        code: "straightness-not-tested",
        severity: "weakens",
        message: `Whether the line is straight was not tested. ${range.message}`,
      },
    ];
  const findings = concentrations.map((concentration) => straightnessAt(range, concentration));
  const beyond = (finding: Straightness) =>
    concentrations.filter((_, i) => findings[i] === finding).map(Math.abs);
  const curved = beyond("curved");
  const open = beyond("not-shown");
  const flags: Flag[] = [];
  if (curved.length > 0) {
    const share = curved.length / concentrations.length;
    flags.push({
      code: "curvature-shown",
      severity: share > LARGEST_SHARE_BEYOND ? "blocks" : "weakens",
      message: `From ${numberInWords(range.curvedFrom ?? Math.min(...curved))} on the signal is curved by more than ${percent(LARGEST_CURVED_PART)} of the net signal; ${percent(share)} of the ${points} lie there. ${keepUpTo === null ? "Leave out the standards at which it bends, or dilute." : `A line up to the standard at ${numberInWords(keepUpTo)} shows no curvature: leave out those above, and dilute what reads higher.`}`,
    });
  }
  if (open.length > 0) {
    flags.push({
      code: "straightness-not-shown",
      severity: "weakens",
      message: `The line is shown to be straight up to ${numberInWords(range.straightUpTo)} only; ${points} at ${inARow([...new Set(open)].sort((a, b) => a - b).map(numberInWords), 5)} lie beyond it, where the standards admit a curved part of up to ${percent(range.mostPerConcentration * Math.max(...open))} of the net signal. ${wayOut(range)}`,
    });
  }
  return flags;
}

function wayOut(range: Extract<LinearRange, { status: "assessed" }>): string {
  if (range.scatterNeeded === null)
    return "Stay below that concentration, or leave out the standards at which the signal bends.";
  const scatter = `a scatter of ${percent(range.scatterNeeded)} of the present one`;
  return range.moreStandards === null
    ? `It would take ${scatter} to show it up to the highest standard.`
    : `${range.moreStandards} more standards on the same levels, or ${scatter}, would show it up to the highest standard if the line is straight.`;
}

/** Least number of further standards with (z + t) u √(n/N) ≤ room; the left side falls with N. */
function moreStandards(error: number, room: number, standards: number, freedom: number): number | null {
  const shows = (more: number) => {
    const factor = studentTFactor(LEVEL, freedom + more) + DEVIATE_OF_PLAN;
    return factor * error * Math.sqrt(standards / (standards + more)) <= room;
  };
  if (!shows(MOST_STANDARDS)) return null;
  let [low, high] = [0, MOST_STANDARDS];
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (shows(middle)) high = middle;
    else low = middle;
  }
  return high;
}
