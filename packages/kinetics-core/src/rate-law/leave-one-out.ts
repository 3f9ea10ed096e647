import { isDetermined } from "./design";
import type { OrdersFit } from "./fit-orders";
import type { RateLawFit } from "./rate-law";
import { gainsOf, logRateConstantFunctional, orderFunctional } from "./uncertainty";

/**
 * The law without each run in turn, weights kept: leaving run j out is giving it an error of its own, of size
 * (Py)_j/P_jj, so a functional moves by −L·A_j (Py)_j/P_jj. Null where the run alone determines it.
 */
export function leaveOneOut(
  free: OrdersFit,
  simple: OrdersFit | null,
  species: readonly string[],
): RateLawFit["leaveOneOut"] {
  const orderMoves = species.map((_, i) => {
    const place = free.design.free.indexOf(i);
    if (place < 0) return null;
    const unit = free.design.free.map((_unused, k) => (k === place ? 1 : 0));
    return isDetermined(free.design, unit) ? moves(free, orderFunctional(free, place)) : null;
  });
  const constantMoves = simple === null ? null : moves(simple, logRateConstantFunctional(simple));
  return free.runs.map((run, j) => ({
    label: run.label,
    rateConstant:
      simple === null || constantMoves === null ? null : constantWithout(simple, constantMoves[j] ?? null),
    orders: Object.fromEntries(
      species.map((name, i) => {
        const held = free.design.held[i] ?? null;
        if (held !== null) return [name, held];
        const move = orderMoves[i]?.[j] ?? null;
        return [name, move === null ? null : (free.orders[i] ?? 0) + move];
      }),
    ),
  }));
}

/** With all orders held the level is ln k itself. */
function constantWithout(simple: OrdersFit, move: number | null): number | null {
  if (move === null) return null;
  const value = Math.exp(simple.level + move);
  return Number.isFinite(value) && value > 0 ? value : null;
}

function moves(fit: OrdersFit, functional: readonly number[]): readonly (number | null)[] {
  const gains = gainsOf(fit, functional);
  const { projected, projectionDiagonal, leverage } = fit.solution;
  const largest = Math.max(...Array.from(gains, Math.abs));
  return fit.runs.map((_, j) => {
    const gain = gains[j] ?? 0;
    if (Math.abs(gain) <= 1e-12 * largest) return 0;
    if ((leverage[j] ?? 1) > 1 - 1e-9) return null;
    return (-gain * (projected[j] ?? 0)) / (projectionDiagonal[j] ?? 1);
  });
}
