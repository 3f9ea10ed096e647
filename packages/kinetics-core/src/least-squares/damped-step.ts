import type { Linearisation } from "./linearisation";

/**
 * Damping λ for which the step p(λ) = −V diag(1/(s² + λ)) h is as long as the trust radius Δ, within a tenth; 0 where
 * the undamped step lies inside. |p(λ)| falls monotonically; Newton's iteration on 1/|p| (Hebden; Moré, Lecture Notes in
 * Mathematics 630 (1978) 105-116) takes two or three rounds, bracketed so that it cannot leave.
 */
export function dampingWithin(linear: Linearisation, radius: number): number {
  const undamped = stepLength(linear, 0);
  if (undamped <= (1 + SLACK) * radius) return 0;
  let low = 0;
  let high = slopeLength(linear) / radius;
  let damping = newtonDamping(linear, 0, undamped, radius);
  for (let round = 0; round < MOST_ROUNDS; round++) {
    if (!(damping > low && damping < high)) damping = Math.max(Math.sqrt(low * high), 1e-3 * high);
    const length = stepLength(linear, damping);
    if (Math.abs(length - radius) <= SLACK * radius) break;
    if (length > radius) low = damping;
    else high = damping;
    damping = newtonDamping(linear, damping, length, radius);
  }
  return damping;
}

const SLACK = 0.1;
const MOST_ROUNDS = 30;

/** One step of Newton's iteration on 1/|p(λ)| − 1/Δ. */
function newtonDamping(
  { singular, slopes }: Linearisation,
  damping: number,
  length: number,
  radius: number,
): number {
  let fall = 0;
  for (let k = 0; k < singular.length; k++) {
    const slope = slopes[k] ?? 0;
    if (slope !== 0) fall += slope ** 2 / ((singular[k] ?? 0) ** 2 + damping) ** 3;
  }
  return damping + ((length / radius) * (length - radius) * length) / fall;
}

function stepLength({ singular, slopes }: Linearisation, damping: number): number {
  let sum = 0;
  for (let k = 0; k < singular.length; k++) {
    const slope = slopes[k] ?? 0;
    if (slope !== 0) sum += (slope / ((singular[k] ?? 0) ** 2 + damping)) ** 2;
  }
  return Math.sqrt(sum);
}

function slopeLength({ slopes }: Linearisation): number {
  let sum = 0;
  for (let k = 0; k < slopes.length; k++) sum += (slopes[k] ?? 0) ** 2;
  return Math.sqrt(sum);
}

/** Writes p(λ) for right-hand side `slopes` (h) into `step`. */
export function fillStep(
  { parameters: n, singular, directions }: Linearisation,
  slopes: Float64Array,
  damping: number,
  step: Float64Array,
): void {
  step.fill(0);
  for (let k = 0; k < n; k++) {
    const value = singular[k] ?? 0;
    if (value === 0) continue;
    const along = (slopes[k] ?? 0) / (value * value + damping);
    for (let j = 0; j < n; j++) step[j] = (step[j] ?? 0) - along * (directions[k * n + j] ?? 0);
  }
}
