/**
 * A rate law v = k·f(c; θ): what a fit needs to know of it, whatever its form. Every candidate is one of these: power,
 * with a background path, reversible, saturating, inhibited by product, autocatalytic, and an expression that a user
 * wrote. Concentrations in mol L⁻¹ and in the order of `species`; k is not among the parameters.
 */
export interface RateEquation {
  /** Kebab-case name of the form, "power", "reversible", "expression". */
  readonly form: string;
  /** The law in one line of plain text, "v = k [A]^n_A [B]^2". */
  readonly law: string;
  /** Species whose concentrations enter, products included where the law needs them. */
  readonly species: readonly string[];
  readonly parameters: readonly EquationParameter[];
  /**
   * Writes f and its derivatives at concentrations `c` ≥ 0. Returns false where f or a derivative has no finite value
   * there, with one exception: at c = 0 the derivative of c^n by c is written as 0 for 0 < n < 1 also, since the course
   * ends there and stays. `f` may be negative only where `reversible`. Nothing is allocated.
   */
  evaluate(c: Float64Array, theta: Float64Array, into: EquationValue): boolean;
  /** f may change its sign: the course ends at an equilibrium and not by exhaustion. */
  readonly reversible: boolean;
  /** Power of concentration in f at θ, for k's unit; null where f has none, such as exp([A]). */
  readonly overallOrder: ((theta: ArrayLike<number>) => number) | null;
  /** Laws that this one turns into at an end of a parameter, for the reading 'not needed'. */
  readonly simpler: readonly SimplerLaw[];
}

export interface EquationParameter {
  /** How tables and messages name it: "n_A", "K_M". */
  readonly name: string;
  /** What it is: an order is a pure number, a constant has a power of concentration. */
  readonly kind: "order" | "constant";
  /** Power of concentration in its unit at θ, which may depend on fitted orders; null where that is not known. */
  readonly concentrationPower: ((theta: ArrayLike<number>) => number) | null;
  readonly start: number;
  readonly bounds: readonly [number, number];
  /** Value at which the added term vanishes, where there is one: the null of 'not needed'. */
  readonly nullValue: number | null;
}

/** With `parameter` at the value `at`, ∞ included, the law is `equation`, of which k may then be another multiple. */
export interface SimplerLaw {
  /** Index among the parameters. */
  readonly parameter: number;
  readonly at: number;
  readonly equation: RateEquation;
}

/** Filled by `evaluate`; made once by `equationValue`. */
export interface EquationValue {
  f: number;
  /** ∂f/∂c_i, in the order of `species`. */
  readonly byConcentration: Float64Array;
  /** ∂f/∂θ_j. */
  readonly byParameter: Float64Array;
}

export function equationValue(equation: {
  readonly species: ArrayLike<string>;
  readonly parameters: ArrayLike<EquationParameter>;
}): EquationValue {
  return {
    f: 0,
    byConcentration: new Float64Array(equation.species.length),
    byParameter: new Float64Array(equation.parameters.length),
  };
}
