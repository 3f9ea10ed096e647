import type { RunLinearisation } from "./run-linearisation";

/**
 * Autocorrelation of the readings and the freedom of their residuals, from a pass with each run at its own ln k.
 *
 * A smooth direction that a fit takes out of first-order autoregressive noise carries λ = (1 + ρ)/(1 − ρ) variances of
 * it in a long trace and λ/(1 + SHORT λ/n) in a short one, so with q of them taken from n residuals
 * r₁ ≈ (nρ − qλ)/(n − qλ) and Σ E r² = σ²(n − qλ): ρ is the root of ρ = r₁ + (1 − r₁) q λ/n, and n − qλ the freedom.
 * In 60 readings at ρ = 0.8 the plain variance is a quarter too small and the plain r₁ 0.06 too low.
 *
 * One instrument reads all runs, so r₁ is that of all of them together: of a single run it is uncertain by
 * √((1 − ρ²)/n), and runs that came out too low would count for too much. Only a run that lies above the others by more
 * than twice that, because its course misses the trace, keeps its own.
 */
export interface ReadingNoise {
  readonly autocorrelation: number;
  /** Residuals less what the fit took out of them, in terms of σ²; > 0. */
  readonly freedom: number;
}

/** At 1 the variance of a mean has no bound; the limit of the initial rates. */
const LARGEST = 0.97;
/**
 * What a short trace takes from λ. Simulation: offset, ln k and shared orders took 2.5, 6.3 and 11 variances a direction
 * from 60 readings at ρ = 0.5, 0.8 and 0.9, and 8 from 30 at 0.9.
 */
const SHORT = 2.5;
/** Part of the points that is left as freedom whatever ρ: beyond it the approximation ends. */
const LEAST_FREEDOM = 0.2;
/** Coefficients that every run spends on its own: offset and ln k. */
const OWN_COEFFICIENTS = 2;

/** `shared`: parameters other than ln k that all runs determine together. */
export function readingNoise(runs: readonly RunLinearisation[], shared: number): readonly ReadingNoise[] {
  const spent = OWN_COEFFICIENTS + shared / runs.length;
  let weighted = 0;
  let points = 0;
  for (const run of runs) {
    weighted += run.points * run.lagOne;
    points += run.points;
  }
  const together = corrected(weighted / points, points / runs.length, spent);
  return runs.map((run) => {
    const own = corrected(run.lagOne, run.points, spent);
    const least = own - 2 * Math.sqrt((1 - own * own) / run.points);
    const autocorrelation = Math.min(LARGEST, Math.max(0, together, least));
    return { autocorrelation, freedom: freedomOf(run.points, autocorrelation, spent) };
  });
}

/** ρ of one run by itself, for its own line in a report. */
export function ownAutocorrelation(run: RunLinearisation): number {
  return Math.max(0, corrected(run.lagOne, run.points, OWN_COEFFICIENTS));
}

function corrected(lagOne: number, points: number, spent: number): number {
  let rho = lagOne;
  for (let turn = 0; turn < 30; turn++) {
    const taken = Math.min(takenFrom(points, rho, spent) / points, 1 - LEAST_FREEDOM);
    rho = Math.max(-LARGEST, Math.min(LARGEST, lagOne + (1 - lagOne) * taken));
  }
  return rho;
}

function freedomOf(points: number, rho: number, spent: number): number {
  return Math.max(points - takenFrom(points, rho, spent), LEAST_FREEDOM * points);
}

/** q λ. */
function takenFrom(points: number, rho: number, spent: number): number {
  const gain = (1 + rho) / (1 - rho);
  return (spent * gain) / (1 + (SHORT * gain) / points);
}
