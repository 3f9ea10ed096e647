/**
 * The linear problem at one point of a nonlinear fit, min |J δ + r|, in scaled steps p = D δ:
 *
 *   J D⁻¹ = Q R   (Householder),   R_A V = W   (one-sided Jacobi, columns of W orthogonal, lengths s),
 *
 * A the parameters that are free to move. The damped step is p = −V diag(1/(s² + λ)) h with h = Wᵀ Qᵀr, so one
 * decomposition serves every damping λ. One-sided Jacobi keeps the relative accuracy of small singular values, and
 * with it the weakly determined directions. Golub and Van Loan, Matrix Computations, 5.2 and 8.6; every array is
 * made once and filled again and again.
 */
export interface Linearisation {
  readonly points: number;
  readonly parameters: number;
  /** D, above 0. */
  readonly scale: Float64Array;
  /** Householder vectors, column after column. */
  readonly reflectors: Float64Array;
  /** 2/|v|² of each. */
  readonly strengths: Float64Array;
  /** R, n by n, column after column. */
  readonly triangle: Float64Array;
  /** First n elements of Qᵀr. */
  readonly projected: Float64Array;
  /** W, n by n; columns whose singular value counts as zero keep their noise but have slope 0. */
  readonly rotated: Float64Array;
  /** V, n by n. */
  readonly directions: Float64Array;
  readonly singular: Float64Array;
  /** h; 0 along undetermined directions. */
  readonly slopes: Float64Array;
  readonly work: Float64Array;
}

/** Singular values below this part of the greatest are rounding: they carry no information. */
const RANK_TOLERANCE = 64 * Number.EPSILON;
const ROTATION_TOLERANCE = 1e-15;
const MOST_SWEEPS = 40;

/** `take` hands out zeroed stretches of one store: a fit makes one array and not a score of small ones. */
export type Take = (length: number) => Float64Array;

export function linearisationSize(points: number, parameters: number): number {
  return points * (parameters + 1) + 3 * parameters * parameters + 5 * parameters;
}

export function newLinearisation(points: number, parameters: number, take: Take): Linearisation {
  return {
    points,
    parameters,
    scale: take(parameters),
    reflectors: take(points * parameters),
    strengths: take(parameters),
    triangle: take(parameters * parameters),
    projected: take(parameters),
    rotated: take(parameters * parameters),
    directions: take(parameters * parameters),
    singular: take(parameters),
    slopes: take(parameters),
    work: take(points),
  };
}

/** Below this a column's inverse square leaves the range of a double; what moves the residuals so little moves nothing. */
const SHORTEST = 1e-150;

/** Length of one column of the Jacobian; 0 for one of no consequence. */
export function lengthOf(column: Float64Array): number {
  const length = Math.sqrt(stretchDot(column, 0, column.length, column, 0));
  return length < SHORTEST ? 0 : length;
}

/** Fills R and Qᵀr for the scales in `into.scale`; no division is left in the passes over the points. */
export function factorise(
  jacobian: readonly Float64Array[],
  residuals: Float64Array,
  into: Linearisation,
): void {
  const { points: m, parameters: n, scale, reflectors, strengths, triangle, projected, work } = into;
  jacobian.forEach((column, j) => {
    const factor = 1 / (scale[j] ?? 1);
    const at = j * m;
    for (let i = 0; i < m; i++) reflectors[at + i] = factor * (column[i] ?? 0);
  });
  work.set(residuals);
  triangle.fill(0);
  projected.fill(0);
  const last = Math.min(m, n);
  for (let k = 0; k < n; k++) {
    for (let i = 0; i < Math.min(k, last); i++) triangle[k * n + i] = reflectors[k * m + i] ?? 0;
    if (k >= last) continue;
    const start = k * m + k;
    const end = k * m + m;
    const diagonal = reflectedLength(reflectors, start, end);
    const first = reflectors[start] ?? 0;
    // v = x − d e₁ with |v|² = 2 d (d − x₁); H = I − (2/|v|²) v vᵀ.
    strengths[k] = diagonal === 0 ? 0 : 1 / (diagonal * (diagonal - first));
    reflectors[start] = first - diagonal;
    triangle[k * n + k] = diagonal;
    for (let j = k + 1; j < n; j++) reflect(into, k, reflectors, j * m + k);
    reflect(into, k, work, k);
  }
  for (let k = 0; k < last; k++) projected[k] = work[k] ?? 0;
}

/** Turns `work` into Qᵀ·work by the reflectors of the last factorisation. */
export function applyReflectors(linear: Linearisation): void {
  for (let k = 0; k < Math.min(linear.points, linear.parameters); k++) reflect(linear, k, linear.work, k);
}

/** Length of a stretch with the sign that its first element has not, so that nothing cancels. */
function reflectedLength(values: Float64Array, start: number, end: number): number {
  const length = Math.sqrt(stretchDot(values, start, end, values, 0));
  return (values[start] ?? 0) > 0 ? -length : length;
}

/** Applies reflector k to the stretch of `target` that begins at `at`. */
function reflect(
  { points, reflectors, strengths }: Linearisation,
  k: number,
  target: Float64Array,
  at: number,
): void {
  const start = k * points + k;
  const end = k * points + points;
  const shift = at - start;
  const projection = (strengths[k] ?? 0) * stretchDot(reflectors, start, end, target, shift);
  if (projection === 0) return;
  for (let i = start; i < end; i++)
    target[i + shift] = (target[i + shift] ?? 0) - projection * (reflectors[i] ?? 0);
}

/** Σ aᵢ b_(i + shift) from `start` up to `end`. */
function stretchDot(a: Float64Array, start: number, end: number, b: Float64Array, shift: number): number {
  let sum = 0;
  for (let i = start; i < end; i++) sum += (a[i] ?? 0) * (b[i + shift] ?? 0);
  return sum;
}

/** Decomposes the columns of R that are free and fills h for the right-hand side `projected`. */
export function decompose(into: Linearisation, free: Uint8Array, projected: Float64Array): void {
  const { parameters: n, triangle, rotated, directions } = into;
  directions.fill(0);
  for (let j = 0; j < n; j++) {
    directions[j * n + j] = 1;
    for (let i = 0; i < n; i++) rotated[j * n + i] = free[j] ? (triangle[j * n + i] ?? 0) : 0;
  }
  for (let sweep = 0; sweep < MOST_SWEEPS; sweep++) {
    let rotations = 0;
    for (let a = 0; a < n - 1; a++) for (let b = a + 1; b < n; b++) rotations += orthogonalise(into, a, b);
    if (rotations === 0) break;
  }
  fillSingular(into, projected);
}

/** One rotation of columns a and b of W and V; 0 where they are orthogonal already. */
function orthogonalise({ parameters: n, rotated, directions }: Linearisation, a: number, b: number): number {
  let alpha = 0;
  let beta = 0;
  let gamma = 0;
  for (let i = 0; i < n; i++) {
    const first = rotated[a * n + i] ?? 0;
    const second = rotated[b * n + i] ?? 0;
    alpha += first * first;
    beta += second * second;
    gamma += first * second;
  }
  if (Math.abs(gamma) <= ROTATION_TOLERANCE * Math.sqrt(alpha * beta)) return 0;
  const zeta = (beta - alpha) / (2 * gamma);
  const tangent = (zeta >= 0 ? 1 : -1) / (Math.abs(zeta) + Math.sqrt(1 + zeta * zeta));
  const cosine = 1 / Math.sqrt(1 + tangent * tangent);
  const sine = cosine * tangent;
  for (let i = 0; i < n; i++) {
    rotate(rotated, a * n + i, b * n + i, cosine, sine);
    rotate(directions, a * n + i, b * n + i, cosine, sine);
  }
  return 1;
}

function rotate(values: Float64Array, a: number, b: number, cosine: number, sine: number): void {
  const first = values[a] ?? 0;
  const second = values[b] ?? 0;
  values[a] = cosine * first - sine * second;
  values[b] = sine * first + cosine * second;
}

function fillSingular({ parameters: n, rotated, singular, slopes }: Linearisation, projected: Float64Array) {
  let greatest = 0;
  for (let k = 0; k < n; k++) {
    let length = 0;
    let slope = 0;
    for (let i = 0; i < n; i++) {
      const value = rotated[k * n + i] ?? 0;
      length += value * value;
      slope += value * (projected[i] ?? 0);
    }
    const value = Math.sqrt(length);
    singular[k] = value;
    slopes[k] = slope;
    greatest = Math.max(greatest, value);
  }
  for (let k = 0; k < n; k++) {
    if ((singular[k] ?? 0) > RANK_TOLERANCE * greatest) continue;
    singular[k] = 0;
    slopes[k] = 0;
  }
}

/** Number of directions that the data determine. */
export function rankIn({ singular }: Linearisation): number {
  let rank = 0;
  for (let k = 0; k < singular.length; k++) if ((singular[k] ?? 0) > 0) rank++;
  return rank;
}

/** Fall of |r|² that the undamped step promises: |Wᵀ-part of r|² = Σ (h/s)². */
export function wholePromise({ singular, slopes }: Linearisation): number {
  let promise = 0;
  for (let k = 0; k < singular.length; k++) {
    const value = singular[k] ?? 0;
    if (value > 0) promise += ((slopes[k] ?? 0) / value) ** 2;
  }
  return promise;
}
