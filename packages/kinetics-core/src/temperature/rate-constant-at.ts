import {
  type Estimate,
  exponentialOf,
  type Flag,
  GAS_CONSTANT,
  noEstimate,
  printNumber,
} from "kinetics-core/quantities";
import { FEWEST_FOR_INTERVAL } from "./constants";
import { estimateFunctional } from "./reciprocal-line";
import type { TemperatureFit } from "./temperature";

export interface RateConstantAt {
  readonly temperatureKelvin: number;
  /** k on the Arrhenius line, in the unit of the points; interval back-transformed. */
  readonly rateConstant: Estimate;
  readonly logRateConstant: Estimate;
  /** What another determination of k there would give: the line's uncertainty and one point's own scatter. */
  readonly newDetermination: Estimate;
  readonly flags: readonly Flag[];
}

/**
 * k at a temperature / K above 0, by the Arrhenius line. Outside the studied range a flag says how far, since no data
 * speak there. Throws RangeError on a temperature that is not above 0.
 */
export function rateConstantAt(fit: TemperatureFit, temperatureKelvin: number): RateConstantAt {
  if (!(temperatureKelvin > 0) || !Number.isFinite(temperatureKelvin))
    throw new RangeError(`a temperature is above 0 K, got ${temperatureKelvin}`);
  const { arrhenius, level } = fit;
  const functional = [1, 1 / temperatureKelvin - arrhenius.centre] as const;
  const options = {
    level,
    degreesOfFreedom: fit.temperatures < FEWEST_FOR_INTERVAL ? null : fit.degreesOfFreedom,
  };
  const logRateConstant = estimateFunctional(arrhenius, functional, options);
  const own = fit.newPointStandardDeviation;
  const anew =
    own === null
      ? noEstimate(level)
      : estimateFunctional(arrhenius, functional, { ...options, added: own ** 2 });
  return {
    temperatureKelvin,
    rateConstant: exponentialOf(logRateConstant),
    logRateConstant,
    newDetermination: exponentialOf(anew),
    flags: extrapolationFlags(fit, temperatureKelvin),
  };
}

/** k(T) over the studied range and `beyondKelvin` to either side, evenly in T, at `steps` + 1 ≥ 2 places; for drawing. */
export function rateConstantBand(
  fit: TemperatureFit,
  steps: number,
  beyondKelvin = 0,
): readonly RateConstantAt[] {
  const [low, high] = fit.range;
  const from = Math.max(low - beyondKelvin, low / 2);
  const to = high + beyondKelvin;
  return Array.from({ length: steps + 1 }, (_, i) => rateConstantAt(fit, from + ((to - from) * i) / steps));
}

/** ΔG‡ / (J mol⁻¹) = ΔH‡ − T ΔS‡ at a temperature / K, far better known within the range than either part. */
export function gibbsEnergyOfActivationAt(fit: TemperatureFit, temperatureKelvin: number): Estimate {
  const { eyring, level } = fit;
  const factor = -GAS_CONSTANT * temperatureKelvin;
  return estimateFunctional(eyring, [factor, factor * (1 / temperatureKelvin - eyring.centre)], {
    level,
    degreesOfFreedom: fit.temperatures < FEWEST_FOR_INTERVAL ? null : fit.degreesOfFreedom,
  });
}

function extrapolationFlags(fit: TemperatureFit, temperatureKelvin: number): readonly Flag[] {
  const [low, high] = fit.range;
  const beyond = Math.max(low - temperatureKelvin, temperatureKelvin - high);
  if (beyond <= 1e-9 * high) return [];
  const side = temperatureKelvin < low ? "below" : "above";
  return [
    {
      code: "temperature-extrapolated",
      severity: "weakens",
      message: `${printNumber(temperatureKelvin, 5)} K lies ${printNumber(beyond, 3)} K ${side} the studied temperatures; the interval holds only if nothing changes on the way there. Measure one rate constant nearer to it.`,
    },
  ];
}
