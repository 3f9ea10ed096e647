import type { Flag } from "kinetics-core/quantities";
import {
  CERTAIN_DRIFT,
  HIGH_AUTOCORRELATION,
  IMPRECISE_RATE,
  LARGEST_DEAD_CONVERSION,
  LARGEST_DRIFT,
  LEAST_EFFECTIVE_POINTS,
  VERY_IMPRECISE_RATE,
} from "./constants";
import type { PreparedTrace } from "./prepared-trace";

/** What a reader should beware of, whichever estimator is reported. `first`: first time used, since mixing. */
export function estimateFlags(
  { readings, noise, progress }: PreparedTrace,
  slope: number,
  standardError: number,
  first: number,
): Flag[] {
  const flags: Flag[] = [];
  if (readings.before > 0) {
    flags.push({
      code: "before-mixing",
      severity: "note",
      message: `${countOf(readings.before, "reading")} before mixing, at time ${readings.timeZero}, ${readings.before === 1 ? "is" : "are"} not used.`,
    });
  }
  const { drift } = readings;
  if (
    drift !== null &&
    Math.abs(drift.slope) > CERTAIN_DRIFT * drift.standardError &&
    Math.abs(drift.slope) > LARGEST_DRIFT * Math.abs(slope)
  ) {
    const part = Math.abs(drift.slope / slope);
    flags.push({
      code: "drift-before-mixing",
      severity: "weakens",
      message:
        `Before mixing the signal drifts at ${part < 1 ? `${(part * 100).toFixed(part < 0.1 ? 1 : 0)} % of` : "no less than"} the rate at mixing; ` +
        "let the instrument and the cell come to rest, or follow a blank beside it.",
    });
  }
  if (readings.signal.every((value) => value === readings.signal[0])) {
    flags.push({
      code: "constant-signal",
      severity: "weakens",
      message:
        "All readings are equal, so the noise is below the resolution of the instrument and the standard error " +
        "says nothing; check the signal column.",
    });
    return flags;
  }
  if (noise.autocorrelation > HIGH_AUTOCORRELATION) {
    flags.push({
      code: "autocorrelated",
      severity: "weakens",
      message:
        `Neighbouring readings correlate by ${noise.autocorrelation.toFixed(2)}, so they tell little more than each other; ` +
        "look for drift, or for smoothing in the instrument.",
    });
  }
  if (noise.effectivePoints < LEAST_EFFECTIVE_POINTS) {
    flags.push({
      code: "few-effective-points",
      severity: "weakens",
      message:
        `The trace holds ${noise.effectivePoints.toFixed(1)} independent readings, fewer than ${LEAST_EFFECTIVE_POINTS}; ` +
        "follow the run for longer or with less smoothing.",
    });
  }
  const relative = standardError / Math.abs(slope);
  if (relative > IMPRECISE_RATE) {
    const percent = relative < 1 ? `${(relative * 100).toFixed(0)} %` : "more than 100 %";
    flags.push({
      code: "imprecise-rate",
      severity: "weakens",
      message:
        relative > VERY_IMPRECISE_RATE
          ? `The rate is known to ${percent} only, too little for a logarithm; a run at higher concentration or a longer window would help.`
          : `The rate is known to ${percent}; a longer run or more readings would help.`,
    });
  }
  if (progress) {
    const missed = (Math.abs(slope) * first) / progress.span;
    if (missed > LARGEST_DEAD_CONVERSION) {
      flags.push({
        code: "dead-time",
        severity: "blocks",
        message:
          `About ${(Math.min(missed, 1) * 100).toFixed(0)} % of the reaction was over before the first reading that is used, ` +
          "so the rate at mixing is an extrapolation; mix faster, dilute, or start the window earlier.",
      });
    }
  }
  return flags;
}

function countOf(count: number, noun: string): string {
  return `${count} ${noun}${count === 1 ? "" : "s"}`;
}
