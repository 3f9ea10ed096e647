/**
 * A rate law v = k·f(c; θ): what a fit needs to know of it, whatever its form. Every candidate is one of these: power,
 * with a background path, reversible, saturating, inhibited by product, autocatalytic, and an expression that a user
 * wrote. Concentrations in mol L⁻¹ and in the order of `species`; k is not among the parameters.
 */
export interface RateEquation {
  /** Kebab-case name of the form, "power", "reversible", "expression". */
  readonly form: string;
  /** Species whose concentrations enter, products included where the law needs them. */
  readonly species: readonly string[];
  readonly parameters: readonly EquationParameter[];
  /**
   * Writes f and its derivatives at concentrations `c` ≥ 0. Returns false where f has no finite value there. `f` may
   * be negative only where `reversible`. Nothing is allocated.
   */
  evaluate(c: Float64Array, theta: Float64Array, into: EquationValue): boolean;
  /** f may change its sign: the course ends at an equilibrium and not by exhaustion. */
  readonly reversible: boolean;
  /** Power of concentration in f, for k's unit; null where it depends on parameters that are fitted. */
  readonly overallOrder: ((theta: ArrayLike<number>) => number) | null;
}

export interface EquationParameter {
  /** How tables and messages name it: "n_A", "K_M". */
  readonly name: string;
  /** What it is: an order is a pure number, a constant has a power of concentration. */
  readonly kind: "order" | "constant";
  readonly concentrationPower: number;
  readonly start: number;
  readonly bounds: readonly [number, number];
  /** Value at which the added term vanishes, where there is one: the null of 'not needed'. */
  readonly nullValue: number | null;
}

/** Filled by `evaluate`; made once by `equationValue`. */
export interface EquationValue {
  f: number;
  /** ∂f/∂c_i, in the order of `species`. */
  readonly byConcentration: Float64Array;
  /** ∂f/∂θ_j. */
  readonly byParameter: Float64Array;
}

export function equationValue(equation: Pick<RateEquation, "species" | "parameters">): EquationValue {
  return {
    f: 0,
    byConcentration: new Float64Array(equation.species.length),
    byParameter: new Float64Array(equation.parameters.length),
  };
}
