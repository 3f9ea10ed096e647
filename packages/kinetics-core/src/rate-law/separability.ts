import { columnOf } from "kinetics-core/linear-algebra";
import {
  type ConcentrationUnit,
  concentrationInWords,
  type Flag,
  inARow,
  numberInWords,
  printUncertain,
} from "kinetics-core/quantities";
import { centredLogarithms, type Design, regressOnOthers, rootMeanSquare } from "./design";
import type { OrdersFit } from "./fit-orders";
import type { OrderCombination, RateLawFit, Separability } from "./rate-law";
import { reducedRows } from "./reduced-rows";
import { combinationFunctional, estimateOfFunctional, uncertaintyOf } from "./uncertainty";
import type { UsableRun } from "./usable-runs";

/**
 * Can the design tell the orders apart? The standard error of an order is the residual scatter over
 * √m · s_(i|others), with s_(i|others) the root-mean-square of ln c_i left after regression on the other free species.
 * A condition index of 30 lets weak designs pass; this measure does not.
 */
const BLOCKS_BELOW = 0.1;
const WEAKENS_BELOW = 0.3;
/** A spread that pipetting alone could make tells nothing. */
const PIPETTING_ERRORS = 3;
/** Coefficients of a regression below this are not worth naming. */
const NAMEABLE = 0.05;

export function separability(
  runs: readonly UsableRun[],
  design: Design,
  species: readonly string[],
): readonly Separability[] {
  const columns = centredLogarithms(runs, design.free);
  return design.free.map((index, i) => {
    const conditionalSpread = rootMeanSquare(regressOnOthers(columns, i).residual);
    const pipetting = rootMeanSquare(runs.map((run) => run.privateErrors[index] ?? 0));
    const blocked = conditionalSpread < BLOCKS_BELOW || conditionalSpread < PIPETTING_ERRORS * pipetting;
    return {
      species: species[index] ?? "",
      spread: rootMeanSquare(columnOf(columns, i)),
      conditionalSpread,
      severity: blocked ? "blocks" : conditionalSpread < WEAKENS_BELOW ? "weakens" : "holds",
    };
  });
}

export interface Separation {
  readonly undetermined: RateLawFit["undetermined"];
  readonly determined: RateLawFit["determined"];
  readonly flags: readonly Flag[];
}

export interface SeparationContext {
  readonly fit: OrdersFit;
  readonly species: readonly string[];
  readonly unit: ConcentrationUnit;
  readonly level: number;
}

/** What the runs leave open, in words with a way out, and what they settle all the same. */
export function separation(context: SeparationContext, measures: readonly Separability[]): Separation {
  const { design } = context.fit;
  const open = design.nullDirections.map((direction) => ({
    direction,
    message: openInWords(context, direction),
  }));
  const covered = new Set(open.flatMap(({ direction }) => namedBy(direction)));
  const hardly: { readonly direction: readonly number[]; readonly message: string }[] = [];
  measures.forEach((measure, i) => {
    if (measure.severity !== "blocks" || covered.has(i)) return;
    const direction = nearlyOpenDirection(context.fit, i);
    for (const involved of namedBy(direction)) covered.add(involved);
    hardly.push({ direction, message: hardlyInWords(context, measure, direction) });
  });
  const named = (direction: readonly number[]) => combinationOf(context, direction);
  const undetermined = [...open, ...hardly].map(({ direction, message }) => ({
    combination: named(direction),
    message,
  }));
  return {
    undetermined,
    determined: determinedCombinations(context),
    flags: [
      ...undetermined.map(
        ({ message }): Flag => ({ code: "orders-not-separable", severity: "blocks", message }),
      ),
      ...measures.filter((measure) => measure.severity === "weakens").map(weaklySeparable),
    ],
  };
}

function weaklySeparable(measure: Separability): Flag {
  const factor = numberInWords(Number(Math.exp(2 * measure.conditionalSpread).toPrecision(2)));
  return {
    code: "orders-weakly-separable",
    severity: "weakens",
    message: `The order in ${measure.species} rests on a spread of about a factor of ${factor} in [${measure.species}] that the other species do not share. More runs at other levels of [${measure.species}], the others kept, would settle it.`,
  };
}

/** Null directions, and combinations of two or more orders that are known although their members are not. */
function determinedCombinations({ fit, species, level }: SeparationContext): RateLawFit["determined"] {
  const { design } = fit;
  if (design.nullDirections.length === 0) return [];
  const rows = Array.from({ length: design.rank }, (_, j) => Array.from(columnOf(design.basis, j)));
  return reducedRows(rows)
    .filter((row) => namedBy(row).length > 1)
    .map((row) => ({
      combination: combinationOf({ fit, species }, row),
      value: estimateOfFunctional(uncertaintyOf(fit, combinationFunctional(fit, row), 0), 0, level),
    }));
}

function openInWords(context: SeparationContext, direction: readonly number[]): string {
  const { fit, unit } = context;
  const involved = namedBy(direction);
  const names = involved.map((i) => nameOf(context, i));
  const [first = 0, second = 0] = involved;
  const base = centralRun(fit);
  if (involved.length === 1) {
    const name = names[0] ?? "";
    const value = base.concentrations[fit.design.free[first] ?? 0] ?? 0;
    return `${name} was the same in every run, ${concentrationInWords(value, unit)}, so its order cannot be known. A run like ${base.label} with ${name} at ${halfAndDouble(value, unit)} would show it; or hold its order, at 0 to count ${name} into k.`;
  }
  const changed = involved.at(-1) ?? 0;
  const changedName = nameOf(context, changed);
  const value = base.concentrations[fit.design.free[changed] ?? 0] ?? 0;
  const wayOut = `A run like ${base.label} with ${changedName} at ${halfAndDouble(value, unit)} and everything else kept would separate them; or hold one of the orders.`;
  if (involved.length > 2)
    return `${inARow(names)} were varied together, so their orders cannot be told apart. ${wayOut}`;
  // Along the data the second species moves as −d₁/d₂ times the first.
  const weight = -(direction[first] ?? 0) / (direction[second] ?? 1);
  const weights = pairOfWeights(fit, first, second, weight);
  const known = estimateOfFunctional(
    uncertaintyOf(fit, combinationFunctional(fit, weights), 0),
    0,
    context.level,
  );
  const how = weight > 0 ? "together" : "against each other";
  return `${inARow(names)} were varied ${how}, so only ${sumInWords(names[0] ?? "", names[1] ?? "", weight)} is known${known.estimate === null ? "" : `, ${valueInWords(known.estimate, known.interval)}`}. ${wayOut}`;
}

function pairOfWeights(fit: OrdersFit, first: number, second: number, weight: number): readonly number[] {
  const weights = fit.design.free.map(() => 0);
  weights[first] = 1;
  weights[second] = weight;
  return weights;
}

function sumInWords(first: string, second: string, weight: number): string {
  const size = Math.abs(weight);
  const factor = Math.abs(size - 1) < 1e-6 ? "" : `${numberInWords(size)} times `;
  return `the order in ${first} ${weight > 0 ? "plus" : "minus"} ${factor}that in ${second}`;
}

function valueInWords(value: number, interval: readonly [number, number] | null): string {
  const half = interval === null ? null : (interval[1] - interval[0]) / 2;
  // Below this the half-width is rounding of an exact table, and says nothing.
  const printed = printUncertain(value, half !== null && half > 1e-6 ? half : null, { power: 0 });
  return printed.uncertainty === null ? printed.value : `${printed.value} ± ${printed.uncertainty}`;
}

function hardlyInWords(
  context: SeparationContext,
  measure: Separability,
  direction: readonly number[],
): string {
  const { fit, unit } = context;
  const others = namedBy(direction)
    .map((i) => nameOf(context, i))
    .filter((name) => name !== measure.species);
  const base = centralRun(fit);
  const index = context.species.indexOf(measure.species);
  const way = `A run like ${base.label} with ${measure.species} at ${halfAndDouble(base.concentrations[index] ?? 0, unit)} and everything else kept would settle it; or hold an order.`;
  const lonely = others.length === 0 || measure.spread < BLOCKS_BELOW;
  return lonely
    ? `${measure.species} was hardly varied: its concentrations lie within ${numberInWords(Number((100 * measure.spread).toPrecision(2)))} % (one standard deviation), too little for an order. ${way}`
    : `${measure.species} was varied almost in step with ${inARow(others)}, so their orders can hardly be told apart. ${way}`;
}

/** e_i less its regression on the others: the combination that the runs all but leave open. */
function nearlyOpenDirection(fit: OrdersFit, which: number): readonly number[] {
  const columns = centredLogarithms(fit.runs, fit.design.free);
  const { coefficients } = regressOnOthers(columns, which);
  const direction = fit.design.free.map(() => 0);
  direction[which] = 1;
  const others = fit.design.free.map((_, i) => i).filter((i) => i !== which);
  others.forEach((i, place) => {
    const coefficient = -(coefficients[place] ?? 0);
    direction[i] = Math.abs(coefficient) < NAMEABLE ? 0 : coefficient;
  });
  return direction;
}

function namedBy(direction: readonly number[]): readonly number[] {
  return direction.flatMap((value, i) => (value === 0 ? [] : [i]));
}

function combinationOf(
  context: { readonly fit: OrdersFit; readonly species: readonly string[] },
  direction: readonly number[],
): OrderCombination {
  return Object.fromEntries(
    namedBy(direction).map((i) => [nameOf(context, i), Number((direction[i] ?? 0).toPrecision(9))]),
  );
}

function nameOf(
  context: { readonly fit: OrdersFit; readonly species: readonly string[] },
  free: number,
): string {
  return context.species[context.fit.design.free[free] ?? 0] ?? "";
}

/** The run closest to the centre of the design: its recipe is the one to repeat. */
function centralRun(fit: OrdersFit): UsableRun {
  const columns = centredLogarithms(fit.runs, fit.design.free);
  let best = 0;
  let least = Number.POSITIVE_INFINITY;
  fit.runs.forEach((_, j) => {
    let distance = 0;
    for (let i = 0; i < columns.columns; i++) distance += (columnOf(columns, i)[j] ?? 0) ** 2;
    if (distance < least - 1e-12) {
      least = distance;
      best = j;
    }
  });
  const run = fit.runs[best];
  if (run === undefined) throw new RangeError("a fit has at least one run");
  return run;
}

function halfAndDouble(value: number, unit: ConcentrationUnit): string {
  return `${numberInWords(value / 2)} or ${concentrationInWords(2 * value, unit)}`;
}
