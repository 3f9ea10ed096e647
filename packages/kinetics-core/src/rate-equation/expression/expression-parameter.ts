import { constantParameter } from "../constant-parameter";
import { orderParameter, START_OF_AN_ORDER } from "../law-of-powers";
import type { EquationParameter } from "../rate-equation";

export interface NamedParameter {
  readonly name: string;
  /** An exponent is a pure number and may be negative. */
  readonly isExponent: boolean;
  readonly concentrationPower: EquationParameter["concentrationPower"];
  readonly start: number | undefined;
}

/** Typical concentrations of the species, and θ where every exponent has its start. */
export interface ExpressionStart {
  readonly concentrations: readonly number[];
  readonly theta: readonly number[];
}

/** Exponents start as orders do, constants at the typical concentration to the power of their unit. */
export function expressionParameter(named: NamedParameter, atStart: ExpressionStart): EquationParameter {
  const { name, isExponent, concentrationPower, start } = named;
  if (isExponent) return orderParameter(name, start ?? START_OF_AN_ORDER);
  return constantParameter({
    name,
    concentrationPower,
    start: start ?? typicalConstant(concentrationPower, atStart),
    nullValue: null,
  });
}

/** Where a constant has the size of what it stands beside; 1 where its unit is not known. */
function typicalConstant(
  power: EquationParameter["concentrationPower"],
  { concentrations, theta }: ExpressionStart,
): number {
  if (power === null || concentrations.length === 0) return 1;
  const sum = concentrations.reduce((total, concentration) => total + Math.log(concentration), 0);
  const start = Math.exp((power(theta) * sum) / concentrations.length);
  return Number.isFinite(start) && start > 0 ? start : 1;
}
