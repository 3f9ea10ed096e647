import type { ConcentrationUnit, Estimate, Flag, TimeUnit } from "kinetics-core/quantities";

/** The shapes of a temperature dependence: rate constants of one law in, activation parameters out. */

export interface TemperaturePoint {
  /** Thermodynamic temperature / K, > 0. */
  readonly temperatureKelvin: number;
  /** Rate constant at it, > 0, all points in one unit and of one law. */
  readonly rateConstant: number;
  /** Its standard uncertainty in the same unit, without what `shared` states. Absent: not known. */
  readonly rateConstantUncertainty?: number;
  /** Private standard uncertainty of the temperature / K: how well this bath was held. Default 0. */
  readonly temperatureUncertaintyKelvin?: number;
  /** Orders of the law that k belongs to, by species: points of different orders are no one law. */
  readonly orders?: Readonly<Record<string, number>>;
}

/** An error that all points share: a stock or ε·l (`relative`, of k), the thermometer (`temperatureKelvin`). */
export interface SharedPointUncertainty {
  readonly source: string;
  /** Relative standard uncertainty that it brings to every k alike. Moves ln A and ΔS‡, never E_a. */
  readonly relative?: number;
  /** Standard uncertainty / K that it brings to every temperature alike. */
  readonly temperatureKelvin?: number;
}

export interface TemperatureInput {
  readonly points: readonly TemperaturePoint[];
  readonly shared?: readonly SharedPointUncertainty[];
  /** Unit of k, for ΔS‡, which refers to 1 mol L⁻¹ and to seconds. Absent: per second, and mol L⁻¹ where it enters. */
  readonly unit?: RateConstantMeasure;
  /**
   * `scatter` (default): weights 1/(u² + f) with f = max(τ̂², mean of u²), errors from residuals but never below what the
   * points state. `stated`: weights 1/u² and errors from residuals alone, the weighted least squares of textbooks, where
   * every point states its u; it undercovers when the stated u are uneven.
   */
  readonly weighting?: "scatter" | "stated";
  /** Confidence level of every interval, default 0.95. */
  readonly level?: number;
}

export interface RateConstantMeasure {
  readonly overallOrder: number;
  readonly concentrationUnit: ConcentrationUnit;
  readonly timeUnit: TimeUnit;
}

type Pair = readonly [number, number];
export type TwoByTwo = readonly [Pair, Pair];

/**
 * A straight line y = b₀ + b₁(1/T − x̄) with what is known of its two coefficients; plain data, so that k at any
 * temperature can be made from a stored fit.
 */
export interface ReciprocalLine {
  /** x̄ / K⁻¹, the weighted mean of 1/T. */
  readonly centre: number;
  /** b₀ and b₁ / K. */
  readonly coefficients: Pair;
  /** Covariance from the scatter of the points, s²(XᵀWX)⁻¹; null where no scatter can be known. */
  readonly scatter: TwoByTwo | null;
  /** Covariance from what the points state about themselves, below which a lucky scatter does not go. */
  readonly floor: TwoByTwo;
  /** Covariance from shared errors, as stated. */
  readonly stated: TwoByTwo;
  /** Square root of the residual sum of squares of y over m − 2, unweighted; null with no degree of freedom. */
  readonly residualStandardDeviation: number | null;
}

export interface CurvatureTest {
  /** dE_a/dT / (J mol⁻¹ K⁻¹); 0 for a straight Arrhenius line. */
  readonly activationEnergySlope: Estimate;
  /** ΔC_p‡ / (J mol⁻¹ K⁻¹) = dE_a/dT − R; 0 for a straight Eyring line. */
  readonly heatCapacityOfActivation: Estimate;
  /** Of the Arrhenius line against the curved one, with 1 and m − 3 degrees of freedom. */
  readonly fStatistic: number;
  readonly pValue: number;
  readonly degreesOfFreedom: number;
}

export interface TemperatureFit {
  readonly status: "fitted";
  /** E_a / (J mol⁻¹). */
  readonly activationEnergy: Estimate;
  /** ln A, A in the unit of the rate constants. */
  readonly logPreExponential: Estimate;
  /** A itself; its interval is back-transformed. */
  readonly preExponential: Estimate;
  /** ΔH‡ / (J mol⁻¹). */
  readonly enthalpyOfActivation: Estimate;
  /** ΔS‡ / (J mol⁻¹ K⁻¹), transmission coefficient 1, at 1 mol L⁻¹. */
  readonly entropyOfActivation: Estimate;
  /** Of E_a and ln A, and of ΔH‡ and ΔS‡, in these units. Null where there is no uncertainty. */
  readonly covariance: { readonly arrhenius: TwoByTwo | null; readonly eyring: TwoByTwo | null };
  /** ln k against 1/T. */
  readonly arrhenius: ReciprocalLine;
  /** ln(k h/(k_B T)), k in mol L⁻¹ and s, against 1/T. */
  readonly eyring: ReciprocalLine;
  /** Number of points less 2. */
  readonly degreesOfFreedom: number;
  /** τ̂: standard deviation of ln k between points beyond their own uncertainty; null where it cannot be known. */
  readonly betweenPointStandardDeviation: number | null;
  /** Standard deviation of ln k that a further point would have, its private errors as those of the points here. */
  readonly newPointStandardDeviation: number | null;
  readonly temperatures: number;
  /** Lowest and highest temperature / K. */
  readonly range: Pair;
  /** Null with fewer than five temperatures. */
  readonly curvature: CurvatureTest | null;
  /** Points in the order given, residual of ln k about the Arrhenius line and weight relative to the greatest. */
  readonly residuals: readonly { readonly residual: number; readonly weight: number }[];
  readonly level: number;
  readonly flags: readonly Flag[];
}

export type TemperatureResult =
  | TemperatureFit
  | {
      readonly status: "too-few-temperatures" | "bad-input";
      /** Dotted place of the value at fault, "points.2.rateConstant"; "points" where it is their number. */
      readonly place: string;
      readonly message: string;
    };
