import type { ColumnSums } from "./column-sums";
import type { PreparedRun, PreparedStudy } from "./prepared-study";
import type { RunLinearisation } from "./run-linearisation";
import type { ColumnLayout } from "./trace-pass";

/**
 * Variable projection of a run's own nuisances out of the sums of its columns [r, J] (Golub and Pereyra 1973, SIAM J.
 * Numer. Anal. 10, 413; with the Jacobian of Kaufman 1975, which is exact here since the offset's column is constant).
 *
 * The offset goes by centring: M_ab = Σ w a b − Σ w a · Σ w b / Σ w, an end reading being one more row of weight
 * σ²/u². A nuisance with a prior (time zero, the run's departure from ε·l) is an observation of its own, δ ± u about
 * the current value: M_ee + σ²/u², then M_ab − M_ae M_eb / M_ee.
 */
export function projectRun(
  sums: ColumnSums,
  endRow: Float64Array,
  endWeight: number,
  layout: ColumnLayout,
  study: PreparedStudy,
  run: PreparedRun,
  ratio: number,
  into: RunLinearisation,
): void {
  const p = layout.parameters;
  const size = 1 + p + into.eliminated.length;
  const m = into.moments;
  const weight = sums.count + endWeight;
  for (let a = 0; a < size; a++) {
    const columnA = columnOf(a, layout, p);
    const factorA = a === size - 1 && study.scaleDeviationVariance > 0 ? ratio / into.scaleRatio : 1;
    const totalA = (sums.sums[columnA] ?? 0) + endWeight * (endRow[columnA] ?? 0);
    for (let b = a; b < size; b++) {
      const columnB = columnOf(b, layout, p);
      const factorB = b === size - 1 && study.scaleDeviationVariance > 0 ? ratio / into.scaleRatio : 1;
      const totalB = (sums.sums[columnB] ?? 0) + endWeight * (endRow[columnB] ?? 0);
      const low = Math.min(columnA, columnB);
      const high = Math.max(columnA, columnB);
      const product =
        (sums.products[low * sums.width + high] ?? 0) +
        endWeight * (endRow[columnA] ?? 0) * (endRow[columnB] ?? 0);
      const value = factorA * factorB * (product - (totalA * totalB) / weight);
      m[a * size + b] = value;
      m[b * size + a] = value;
    }
  }
  into.lagOne = sums.lagOne();
  into.startSignal = ((sums.sums[0] ?? 0) + endWeight * (endRow[0] ?? 0)) / weight;
  eliminate(m, size, study, run, into);
  into.residualSquares = Math.max(0, m[0] ?? 0);
  for (let a = 0; a < p; a++) {
    into.gradient[a] = m[1 + a] ?? 0;
    for (let b = 0; b < p; b++) into.gram[a * p + b] = m[(1 + a) * size + 1 + b] ?? 0;
  }
}

/** Column of the blocks behind place `a` of [r, θ, time zero, scale departure]. */
function columnOf(a: number, layout: ColumnLayout, p: number): number {
  if (a < 2 + layout.lawParameters) return a;
  if (a <= p) return layout.scaleColumn;
  return a === p + 1 && layout.timeColumn >= 0 ? layout.timeColumn : layout.scaleColumn;
}

/** Takes the nuisances out, last first; what one row leaves behind is kept for `updateNuisances`. */
function eliminate(
  m: Float64Array,
  size: number,
  study: PreparedStudy,
  run: PreparedRun,
  into: RunLinearisation,
): void {
  let place = size - 1;
  for (const kept of into.eliminated) {
    const isScale = study.scaleDeviationVariance > 0 && place === size - 1;
    const variance = isScale ? study.scaleDeviationVariance : (run.timeZero?.variance ?? 0);
    const gap = isScale ? 1 - into.scaleRatio : (run.timeZero?.value ?? 0) - into.timeZero;
    // Without an uncertainty the nuisance is no unknown of this run.
    const precision = variance > 0 ? into.noise / variance : 0;
    const pivot = (m[place * size + place] ?? 0) + precision;
    kept.fill(0);
    if (variance > 0 && pivot > 0) {
      m[place] = (m[place] ?? 0) + precision * gap;
      m[place * size] = m[place] ?? 0;
      m[0] = (m[0] ?? 0) + precision * gap * gap;
      for (let a = 0; a < place; a++) kept[a] = (m[a * size + place] ?? 0) / pivot;
      for (let a = 0; a < place; a++)
        for (let b = 0; b < place; b++)
          m[a * size + b] = (m[a * size + b] ?? 0) - (kept[a] ?? 0) * (m[place * size + b] ?? 0);
    }
    place--;
  }
}

/** Moves a run's nuisances after θ has moved by `step` (and ln k of this run by `ownStep` more). */
export function updateNuisances(
  study: PreparedStudy,
  into: RunLinearisation,
  step: Float64Array,
  ownStep: number,
): void {
  const p = step.length;
  const size = 1 + p + into.eliminated.length;
  const moved: number[] = [];
  for (let e = into.eliminated.length - 1; e >= 0; e--) {
    const kept = into.eliminated[e];
    if (kept === undefined) continue;
    const place = size - 1 - e;
    let change = (kept[0] ?? 0) - (kept[1] ?? 0) * ownStep;
    for (let a = 0; a < p; a++) change -= (kept[1 + a] ?? 0) * (step[a] ?? 0);
    moved.forEach((earlier, i) => {
      change -= (kept[1 + p + i] ?? 0) * earlier;
    });
    moved.push(change);
    if (study.scaleDeviationVariance > 0 && place === size - 1)
      into.scaleRatio = Math.max(0.05, into.scaleRatio + change);
    else into.timeZero += change;
  }
}
