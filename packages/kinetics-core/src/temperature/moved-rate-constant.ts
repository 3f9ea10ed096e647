import { type Estimate, estimateOf, GAS_CONSTANT, type Uncertain } from "kinetics-core/quantities";

export interface RateConstantAtOneTemperature {
  readonly logRateConstant: Uncertain;
  readonly temperatureKelvin: number;
}

/**
 * ln k moved to another temperature with an activation energy / (J mol⁻¹) known from elsewhere:
 *     ln k₂ = ln k₁ + (E_a/R)(1/T₁ − 1/T₂),   u² = u²(ln k₁) + ((1/T₁ − 1/T₂)/R)² u²(E_a).
 * `toKelvin: Infinity` gives ln A. The interval is normal, since both uncertainties are stated.
 */
export function movedLogRateConstant(
  from: RateConstantAtOneTemperature,
  activationEnergy: Uncertain,
  toKelvin: number,
  level = 0.95,
): Estimate {
  const lever = (1 / from.temperatureKelvin - 1 / toKelvin) / GAS_CONSTANT;
  return estimateOf(
    from.logRateConstant.value + activationEnergy.value * lever,
    Math.hypot(from.logRateConstant.standardUncertainty, lever * activationEnergy.standardUncertainty),
    Number.POSITIVE_INFINITY,
    level,
  );
}
