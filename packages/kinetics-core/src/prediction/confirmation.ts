import { studentTFactor, studentTSurvival } from "kinetics-core/distributions";
import { type Flag, percent } from "kinetics-core/quantities";

/**
 * A confirmation run: the prediction is sealed before the run is made, then the run is judged against it. Plain data,
 * so that it can be stored and hashed; everything about the band is fixed when it is sealed.
 */
export interface SealedPrediction {
  /** What is predicted, for the record: "rate", "time to 90 %". */
  readonly quantity: string;
  readonly unit: string;
  /** ln of the predicted value. */
  readonly logarithm: number;
  /** Standard deviation of ln of the measured value about it: law, run scatter and the measurement's own error. */
  readonly standardDeviation: number;
  readonly degreesOfFreedom: number;
  readonly level: number;
  /** Inside this band the run confirms. */
  readonly band: readonly [number, number];
  /** Relative standard uncertainty of the measurement that the band counted on. */
  readonly measurementRelative: number;
}

export type SealResult =
  | { readonly status: "sealed"; readonly sealed: SealedPrediction }
  | { readonly status: "no-band"; readonly message: string };

export interface SealRequest {
  readonly quantity: string;
  readonly unit: string;
  readonly logarithm: number;
  /** Variance of ln for one new run, the law's with τ²; `newRunVariance` of a prediction. */
  readonly newRunVariance: number | null;
  /** `newRunDegreesOfFreedom` of that prediction. */
  readonly degreesOfFreedom: number | null;
  /** Expected relative standard uncertainty of the measurement itself; default 0. */
  readonly measurementRelative?: number;
  readonly level?: number;
}

export function sealPrediction(request: SealRequest): SealResult {
  const { quantity, unit, logarithm, newRunVariance, degreesOfFreedom } = request;
  const { measurementRelative = 0, level = 0.95 } = request;
  if (!(measurementRelative >= 0))
    throw new RangeError(`a relative uncertainty is 0 or above, got ${measurementRelative}`);
  if (newRunVariance === null || degreesOfFreedom === null || !(degreesOfFreedom > 0))
    return {
      status: "no-band",
      message: `The law gives no interval for one new run, so no band can be sealed for the ${quantity}. One more run than parameters gives it.`,
    };
  const standardDeviation = Math.sqrt(newRunVariance + measurementRelative ** 2);
  const half = standardDeviation === 0 ? 0 : standardDeviation * studentTFactor(level, degreesOfFreedom);
  const band = [Math.exp(logarithm - half), Math.exp(logarithm + half)] as const;
  if (!band.every((end) => Number.isFinite(end) && end > 0))
    return {
      status: "no-band",
      message: `The band of the ${quantity} is wider than a number can say, so a run could not fail it. Narrow the law first.`,
    };
  return {
    status: "sealed",
    sealed: {
      quantity,
      unit,
      logarithm,
      standardDeviation,
      degreesOfFreedom,
      level,
      band,
      measurementRelative,
    },
  };
}

export interface Judgement {
  readonly verdict: "inside" | "outside";
  /** Two-sided: how often a run of the sealed law lies at least as far off. */
  readonly pValue: number;
  /** ln(measured/predicted) over the sealed standard deviation. */
  readonly deviation: number;
  /** measured/predicted. */
  readonly ratio: number;
  readonly flags: readonly Flag[];
}

/** A measurement this much worse than planned widens what its run can show. */
const WORSE_THAN_PLANNED = 1.5;
/** A band this wide on the logarithm (a factor of 2 either way) hardly any run could miss. */
const WIDE_BAND = Math.LN2;

/** Throws RangeError on a measured value that is not above 0; the band stays what it was when sealed. */
export function judgeConfirmation(
  sealed: SealedPrediction,
  measured: { readonly value: number; readonly relative: number },
): Judgement {
  if (!(measured.value > 0) || !Number.isFinite(measured.value))
    throw new RangeError(`a measured ${sealed.quantity} is above 0, got ${measured.value}`);
  const difference = Math.log(measured.value) - sealed.logarithm;
  const inside = measured.value >= sealed.band[0] && measured.value <= sealed.band[1];
  const exact = sealed.standardDeviation === 0;
  const deviation = exact ? 0 : difference / sealed.standardDeviation;
  const halfWidth = Math.log(sealed.band[1] / sealed.band[0]) / 2;
  const flags: Flag[] = [];
  if (measured.relative > WORSE_THAN_PLANNED * sealed.measurementRelative && measured.relative > 0.01)
    flags.push({
      code: "measured-worse-than-planned",
      severity: "weakens",
      message: `The measurement is known to ${percent(measured.relative)}, the band counted on ${percent(sealed.measurementRelative)}: lying ${inside ? "inside" : "outside"} it says less. Measure again, or seal the next band with the real figure.`,
    });
  if (halfWidth > WIDE_BAND)
    flags.push({
      code: "wide-band",
      severity: "weakens",
      message:
        "The sealed band spans more than a factor of two either way, so a run inside it confirms little. Narrow the law before the next confirmation.",
    });
  return {
    verdict: inside ? "inside" : "outside",
    pValue: exact ? Number(inside) : 2 * studentTSurvival(Math.abs(deviation), sealed.degreesOfFreedom),
    deviation,
    ratio: Math.exp(difference),
    flags,
  };
}
