import { columnOf, correlatedLeastSquares, matrixFromColumns } from "kinetics-core/linear-algebra";
import { logConcentrations } from "./design";
import type { OrdersFit } from "./fit-orders";
import type { AddedVariable } from "./rate-law";
import { blockLoadings } from "./restricted-likelihood";
import { loadingOf } from "./shared-errors";

/**
 * Added-variable plots. For drawing, each run's rate is moved along the fitted law to the centre of all other species
 * and set against its own concentration. For inference, x and y are the residuals of ln c and of ln v on the others
 * under the weights of the fit, so that the weighted slope through the origin of y on x is the fitted order.
 */
export function addedVariables(
  fit: OrdersFit,
  species: readonly string[],
  slopes: readonly (number | null)[],
): readonly AddedVariable[] {
  return species.map((name, i) => {
    const held = fit.design.held[i] !== null;
    const logarithms = logConcentrations(fit.runs, i);
    const hasLogarithms = fit.runs.every((run) => (run.concentrations[i] ?? 0) > 0);
    const x = hasLogarithms ? residualOnOthers(fit, logarithms, i) : null;
    const y = hasLogarithms ? residualOnOthers(fit, workingRates(fit, i), i) : null;
    return {
      species: name,
      held,
      slope: slopes[i] ?? null,
      points: fit.runs.flatMap((run, j) => {
        const rateAtCentre = run.rate * Math.exp(-partOfOthers(fit, i, j));
        // Orders of a design that all but fixes none can carry a rate beyond what a double holds, or a drawing shows.
        if (!Number.isFinite(rateAtCentre)) return [];
        const concentration = run.concentrations[i] ?? 0;
        return [{ label: run.label, concentration, rateAtCentre, x: x?.[j] ?? null, y: y?.[j] ?? null }];
      }),
    };
  });
}

/** Σ over the other species of order·(ln c − mean): what takes the run to their centre. */
function partOfOthers(fit: OrdersFit, species: number, run: number): number {
  return fit.orders.reduce((sum, order, i) => {
    const concentration = fit.runs[run]?.concentrations[i] ?? 0;
    if (i === species || order === 0 || concentration <= 0) return sum;
    return sum + order * (Math.log(concentration) - (fit.design.means[i] ?? 0));
  }, 0);
}

/** ln v (or its working value on the rate scale) less the held orders of all other species. */
function workingRates(fit: OrdersFit, species: number): Float64Array {
  const { terms } = fit.design;
  return Float64Array.from(fit.runs, (run, j) => {
    let value = fit.residuals[j] ?? 0;
    for (let t = 0; t < terms.columns; t++)
      value += (columnOf(terms, t)[j] ?? 0) * (fit.solution.coefficients[t] ?? 0);
    const order = fit.design.held[species];
    const concentration = run.concentrations[species] ?? 0;
    // A held species' own part was taken out of the response; its plot shows it.
    return order === null || order === undefined ? value : value + order * Math.log(concentration);
  });
}

function residualOnOthers(fit: OrdersFit, values: ArrayLike<number>, species: number): Float64Array {
  const others = fit.design.free.filter((i) => i !== species).map((i) => logConcentrations(fit.runs, i));
  const columns = independentColumns([fit.runs.map(() => 1), ...others]);
  const shared = fit.shared
    .filter((error) => error.runs !== null)
    .map((error) => loadingOf(error, fit.orders, fit.runs.length));
  const between = Math.sqrt(fit.betweenBlocks ?? 0);
  const blocks =
    between > 0 ? blockLoadings(fit.blocks, fit.runs.length).map((z) => z.map((one) => one * between)) : [];
  return correlatedLeastSquares(matrixFromColumns(columns, fit.runs.length), values, fit.ownVariances, [
    ...shared,
    ...blocks,
  ]).residuals;
}

/** Leaves out columns that the ones before already span, by Gram-Schmidt. */
function independentColumns(columns: readonly (readonly number[])[]): readonly (readonly number[])[] {
  const kept: (readonly number[])[] = [];
  const directions: number[][] = [];
  for (const column of columns) {
    const rest = [...column];
    // Twice, so that rounding of the first pass is taken out as well.
    for (let pass = 0; pass < 2; pass++) {
      for (const direction of directions) {
        const projection = direction.reduce((sum, value, j) => sum + value * (rest[j] ?? 0), 0);
        direction.forEach((value, j) => {
          rest[j] = (rest[j] ?? 0) - projection * value;
        });
      }
    }
    const length = Math.sqrt(rest.reduce((sum, value) => sum + value ** 2, 0));
    if (length <= 1e-7 * Math.sqrt(column.length)) continue;
    kept.push(column);
    directions.push(rest.map((value) => value / length));
  }
  return kept;
}
