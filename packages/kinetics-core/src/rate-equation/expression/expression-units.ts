import type { ExpressionNode } from "./expression-node";
import { type Degree, expressionScaling, genericValues } from "./expression-scaling";

/**
 * Powers of concentration in an expression and in its parameters, from the demand that both sides of every sum have one
 * unit and that exponents and arguments of functions have none; plain numbers have none either. They may depend on
 * fitted exponents: β in [A]^a + β has the power a.
 */
export interface ExpressionUnits {
  /** Null where the demands contradict each other, as in 2 + [A], or leave it open. */
  readonly whole: PowerAt | null;
  /** In the order of the parameters. */
  readonly parameters: readonly (PowerAt | null)[];
}

type PowerAt = (theta: ArrayLike<number>) => number;

export function expressionUnits(node: ExpressionNode, parameters: readonly string[]): ExpressionUnits {
  const at = (target: Target, values: (parameter: string) => number): number | null => {
    const { degree, demands } = expressionScaling(node, parameters, values);
    const row =
      target === "whole" ? degree : new Float64Array(parameters.length + 1).fill(1, target + 1, target + 2);
    return valueGiven(
      demands.map((demand) => demand.degree),
      row,
    );
  };
  const powerAt = (target: Target): PowerAt | null => {
    if (at(target, genericValues(parameters)) === null) return null;
    return (theta) => {
      const near = (shift: number) =>
        at(target, (name) => (theta[parameters.indexOf(name)] ?? Number.NaN) + shift);
      // An exponent of exactly zero takes away a demand that its neighbours make; the power is continuous in θ.
      return near(0) ?? near(SHIFT) ?? 0;
    };
  };
  return { whole: powerAt("whole"), parameters: parameters.map((_, j) => powerAt(j)) };
}

/** The whole expression, or a parameter by its place. */
type Target = "whole" | number;

/** Below what a unit is printed to, above what NOTHING takes for zero. */
const SHIFT = 1e-7;

/** Degrees are sums and products of a few numbers of order one. */
const NOTHING = 1e-9;

/**
 * Value of the affine form target₀ + Σ target_j x_j where all forms of `rows` vanish; null where they cannot vanish
 * together or leave it open. Elimination with pivoting: every row takes one unknown out of the others and the target.
 */
function valueGiven(rows: readonly Degree[], target: Degree): number | null {
  const open = rows.map((row) => row.slice());
  const wanted = target.slice();
  while (true) {
    const [row, column] = largestEntry(open);
    if (row === null) break;
    open.splice(open.indexOf(row), 1);
    for (const other of [...open, wanted]) subtractMultiple(other, row, column);
  }
  const isContradiction = open.some((row) => Math.abs(row[0] ?? 0) > NOTHING);
  const isOpen = wanted.some((entry, i) => i > 0 && Math.abs(entry) > NOTHING);
  return isContradiction || isOpen ? null : (wanted[0] ?? null);
}

function largestEntry(rows: readonly Degree[]): readonly [Degree | null, number] {
  let largest = NOTHING;
  let found: readonly [Degree | null, number] = [null, 0];
  for (const row of rows) {
    for (let i = 1; i < row.length; i++) {
      const size = Math.abs(row[i] ?? 0);
      if (size > largest) {
        largest = size;
        found = [row, i];
      }
    }
  }
  return found;
}

function subtractMultiple(row: Degree, pivot: Degree, column: number): void {
  const multiple = (row[column] ?? 0) / (pivot[column] ?? 1);
  for (let i = 0; i < row.length; i++) row[i] = (row[i] ?? 0) - multiple * (pivot[i] ?? 0);
  row[column] = 0;
}
