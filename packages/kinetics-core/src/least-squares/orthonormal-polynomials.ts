import { dot } from "kinetics-core/linear-algebra";

/**
 * Polynomials that are orthonormal on a set of abscissae, by the three-term recurrence of Forsythe
 * (J. Soc. Indust. Appl. Math. 5 (1957) 74-88):
 *
 *   β_{j+1} p_{j+1}(u) = (u − α_j) p_j(u) − β_j p_{j−1}(u),   p_0 = 1/√m,
 *
 * with u the abscissa centred and scaled to [−1, 1]. A least-squares polynomial of degree d is then
 * Σ_{j≤d} (p_jᵀy) p_j: every lower degree is a partial sum of a higher one, nothing is inverted, and the cost
 * grows linearly with the number of points.
 */
export interface PolynomialBasis {
  readonly degree: number;
  readonly points: number;
  /** `points` × (`degree` + 1), column after column: p_j at the abscissae. */
  readonly columns: Float64Array;
  readonly recurrence: PolynomialRecurrence;
}

/** All that is needed to evaluate the polynomials away from the points. */
export interface PolynomialRecurrence {
  readonly centre: number;
  readonly halfWidth: number;
  readonly first: number;
  readonly alpha: readonly number[];
  readonly beta: readonly number[];
}

/**
 * The basis on `abscissae[from…to)`. Abscissae: strictly increasing, at least `degree` + 1 of them in the
 * range; `scratch` may hold the columns (length ≥ (to − from)·(degree + 1)) and is then overwritten.
 * Throws `RangeError` where the points cannot carry the degree.
 */
export function orthonormalPolynomials(
  abscissae: Float64Array,
  from: number,
  to: number,
  degree: number,
  scratch?: Float64Array,
): PolynomialBasis {
  const points = to - from;
  if (points < degree + 1 || from < 0 || to > abscissae.length) {
    throw new RangeError(`${points} points cannot carry a polynomial of degree ${degree}`);
  }
  const low = abscissae[from] ?? 0;
  const high = abscissae[to - 1] ?? 0;
  const centre = (low + high) / 2;
  const halfWidth = points > 1 ? (high - low) / 2 : 1;
  const columns = scratch?.subarray(0, points * (degree + 1)) ?? new Float64Array(points * (degree + 1));
  const first = 1 / Math.sqrt(points);
  columns.fill(first, 0, points);
  const alpha: number[] = [];
  const beta: number[] = [];

  for (let j = 0; j < degree; j++) {
    const current = columns.subarray(j * points, (j + 1) * points);
    const previous = columns.subarray(Math.max(j - 1, 0) * points, Math.max(j, 1) * points);
    const next = columns.subarray((j + 1) * points, (j + 2) * points);
    let alphaJ = 0;
    for (let i = 0; i < points; i++) {
      const p = current[i] ?? Number.NaN;
      alphaJ += (((abscissae[from + i] ?? Number.NaN) - centre) / halfWidth) * p * p;
    }
    const betaJ = j === 0 ? 0 : (beta[j - 1] ?? 0);
    let squares = 0;
    for (let i = 0; i < points; i++) {
      const u = ((abscissae[from + i] ?? Number.NaN) - centre) / halfWidth;
      const value = (u - alphaJ) * (current[i] ?? Number.NaN) - betaJ * (previous[i] ?? Number.NaN);
      next[i] = value;
      squares += value * value;
    }
    const norm = Math.sqrt(squares);
    for (let i = 0; i < points; i++) next[i] = (next[i] ?? Number.NaN) / norm;
    alpha.push(alphaJ);
    beta.push(norm);
  }
  return { degree, points, columns, recurrence: { centre, halfWidth, first, alpha, beta } };
}

/** Inner products p_jᵀy, j = 0 … degree, with `values[from…from + points)`. */
export function projectOn(basis: PolynomialBasis, values: Float64Array, from: number): number[] {
  const { points, columns, degree } = basis;
  const part = values.subarray(from, from + points);
  return Array.from({ length: degree + 1 }, (_, j) =>
    dot(columns.subarray(j * points, (j + 1) * points), part),
  );
}

/** p_j and dp_j/dx at any abscissa, j = 0 … degree. */
export function polynomialsAt(
  recurrence: PolynomialRecurrence,
  abscissa: number,
): { readonly values: number[]; readonly derivatives: number[] } {
  const { centre, halfWidth, first, alpha, beta } = recurrence;
  const u = (abscissa - centre) / halfWidth;
  const values = [first];
  const derivatives = [0];
  for (let j = 0; j < alpha.length; j++) {
    const p = values[j] ?? 0;
    const d = derivatives[j] ?? 0;
    const betaJ = j === 0 ? 0 : (beta[j - 1] ?? 0);
    const next = beta[j] ?? 1;
    values.push(((u - (alpha[j] ?? 0)) * p - betaJ * (values[j - 1] ?? 0)) / next);
    derivatives.push((p / halfWidth + (u - (alpha[j] ?? 0)) * d - betaJ * (derivatives[j - 1] ?? 0)) / next);
  }
  return { values, derivatives };
}

/**
 * Coefficients c_0 … c_degree of Σ_j weights[j]·p_j(x) as a plain polynomial in x (about zero).
 * For drawing; slopes and errors come from `polynomialsAt`.
 */
export function plainCoefficients(recurrence: PolynomialRecurrence, weights: readonly number[]): number[] {
  const { centre, halfWidth, first, alpha, beta } = recurrence;
  const degree = weights.length - 1;
  const basis: number[][] = [[first]];
  for (let j = 0; j < degree; j++) {
    // u − α_j = x/h − (c/h + α_j)
    const current = basis[j] ?? [];
    const previous = j === 0 ? [] : (basis[j - 1] ?? []);
    const shift = centre / halfWidth + (alpha[j] ?? 0);
    const betaJ = j === 0 ? 0 : (beta[j - 1] ?? 0);
    const next: number[] = [];
    for (let power = 0; power <= j + 1; power++) {
      const raised = power === 0 ? 0 : (current[power - 1] ?? 0) / halfWidth;
      next.push((raised - shift * (current[power] ?? 0) - betaJ * (previous[power] ?? 0)) / (beta[j] ?? 1));
    }
    basis.push(next);
  }
  const coefficients = new Array<number>(degree + 1).fill(0);
  basis.forEach((polynomial, j) => {
    polynomial.forEach((coefficient, power) => {
      coefficients[power] = (coefficients[power] ?? 0) + (weights[j] ?? 0) * coefficient;
    });
  });
  return coefficients;
}
