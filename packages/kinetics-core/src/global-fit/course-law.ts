import type { CourseSystem } from "./dormand-prince";

/**
 * A rate law along the course of a run: the state is ξ and one further component for each free parameter θ_j.
 *
 * From τ = ∫₀^ξ dξ'/f(ξ'; θ) at fixed τ follows, for a law of one sign, ∂ξ/∂θ_j = f(ξ) ∫₀^τ (∂ln f/∂θ_j) dτ'. The
 * component is that integral (`sensitivity: "integral"`). Where f may pass zero the logarithm diverges; the component
 * is then ∂ξ/∂θ_j itself, by its variational equation dz/dτ = (∂f/∂ξ) z + ∂f/∂θ_j (`sensitivity: "variation"`).
 * ∂ξ/∂ln k = τ f(ξ) for both.
 */
export interface CourseLaw extends CourseSystem {
  readonly sensitivity: "integral" | "variation";
  /** Names of the free parameters, in the order of the components. */
  readonly free: readonly string[];
  /** Inclusive bounds of each. */
  readonly bounds: readonly (readonly [number, number])[];
  readonly starts: readonly number[];
  /** Largest change of each in one step of the search; Infinity where any is sensible. */
  readonly largestSteps: readonly number[];
  /** Takes up a run's starting concentrations (in the order of the study's species) and the free parameters. */
  begin(concentrations: Float64Array, theta: ArrayLike<number>): void;
  /** Σ of powers of concentration in f at these free parameters, for the unit of k; null where the form has none. */
  overallOrder(theta: ArrayLike<number>): number | null;
}

/** A species of a study with its signed stoichiometric number; 0 for what takes part and is not used up. */
export interface StudySpecies {
  readonly name: string;
  readonly stoichiometricNumber: number;
}
