import { studentTFactor } from "kinetics-core/distributions";
import type { FittedLaw } from "kinetics-core/prediction";
import { type Flag, inARow, numberInWords } from "kinetics-core/quantities";
import { type FeasibleSet, isFeasible, type Recipe, recipeGrid } from "./feasible-set";
import { cautionsOf } from "./planning-cautions";
import {
  type Design,
  designOf,
  gradientAt,
  leverageOf,
  parameterNames,
  spread,
  standardErrorsOf,
  withRun,
} from "./run-information";

export interface TargetRequest {
  readonly law: FittedLaw;
  readonly made: readonly Recipe[];
  readonly feasible: FeasibleSet;
  /** s of ln v of one run. */
  readonly scatter: number;
  /** Wanted for each parameter, "ln k" (0.05 is 5 % of k) or "n_A". */
  readonly targets: Readonly<Record<string, number>>;
  /** What the targets are: half-widths of intervals at the law's level (default) or standard uncertainties. */
  readonly measure?: "half-width" | "standard-uncertainty";
  /** Standard uncertainty of ln k that more runs do not lower: stocks, ε·l, temperature. Default 0. */
  readonly sharedRelative?: number;
  /** Further runs considered; default 50. */
  readonly most?: number;
}

export interface TargetStep {
  /** Runs beyond those made. */
  readonly more: number;
  /** The run that was added; null at `more: 0`. */
  readonly recipe: Recipe | null;
  /** Half-width or standard uncertainty of every parameter; null where there is none yet. */
  readonly precision: Readonly<Record<string, number | null>>;
}

export type TargetResult =
  | {
      readonly status: "reached" | "within-reach";
      /** `stop`: the runs made suffice. */
      readonly decision: "stop" | "continue";
      /** Runs still to make, placed where they help the wanted parameters most. */
      readonly more: number;
      readonly steps: readonly TargetStep[];
      readonly message: string;
      readonly flags: readonly Flag[];
    }
  | {
      readonly status: "out-of-reach";
      readonly decision: "continue";
      readonly more: null;
      readonly steps: readonly TargetStep[];
      readonly message: string;
      readonly flags: readonly Flag[];
    }
  | { readonly status: "bad-input"; readonly place: string; readonly message: string };

const MOST_FURTHER_RUNS = 50;

/**
 * How many more runs a wanted precision takes: stop or continue. Half-width = t(m − q)·√(s² C_ii + shared²), with the
 * scatter as fitted so far; each further run is the one of the grid that lowers the worst ratio of squared half-width to
 * target most. It is a forecast: s itself is known from few runs, so ask again after each.
 */
export function runsToTarget(request: TargetRequest): TargetResult {
  const { law, made, feasible, targets, most = MOST_FURTHER_RUNS } = request;
  const names = parameterNames(law);
  const fault = faultOf(request, names);
  if (fault !== null) return fault;
  const floor = floorFault(request);
  const gradient = gradientAt(law);
  const grid = recipeGrid(feasible).flatMap((recipe) => {
    const row = gradient(recipe);
    return row === null ? [] : [{ recipe, row }];
  });
  let design = designOf(law, made);
  const steps: TargetStep[] = [{ more: 0, recipe: null, precision: precisionOf(design, request) }];
  for (let more = 0; more <= most; more++) {
    const current = steps.at(-1)?.precision ?? {};
    if (
      Object.entries(targets).every(([name, target]) => (current[name] ?? Number.POSITIVE_INFINITY) <= target)
    )
      return reached(more, steps, law);
    if (floor !== null || more === most) break;
    const before = design;
    const best = bestFor(grid, before, targets, names);
    if (best === null) break;
    design = withRun(before, best.row);
    steps.push({ more: more + 1, recipe: best.recipe, precision: precisionOf(design, request) });
  }
  return {
    status: "out-of-reach",
    decision: "continue",
    more: null,
    steps,
    message:
      floor ??
      `Not even ${most} more runs within these ranges reach the wanted precision. Widen the ranges, lower the scatter of the runs, or ask for less.`,
    flags: cautionsOf(law, recipesOf(steps)),
  };
}

function recipesOf(steps: readonly TargetStep[]): readonly Recipe[] {
  return steps.flatMap(({ recipe }) => (recipe === null ? [] : [recipe]));
}

function reached(more: number, steps: readonly TargetStep[], law: FittedLaw): TargetResult {
  const flags = cautionsOf(law, recipesOf(steps));
  if (more === 0)
    return {
      status: "reached",
      decision: "stop",
      more,
      steps,
      message: "The runs made reach the wanted precision: stop, or spend further runs on checking the law.",
      flags,
    };
  return {
    status: "within-reach",
    decision: "continue",
    more,
    steps,
    message: `${more === 1 ? "One more run is" : `${more} more runs are`} expected to reach the wanted precision, if the scatter stays what it was. Ask again after ${more === 1 ? "it" : "each"}.`,
    flags,
  };
}

interface Candidate {
  readonly recipe: Recipe;
  readonly row: Float64Array;
}

/** The run after which the parameter furthest from its target is nearest to it. */
function bestFor(
  grid: readonly Candidate[],
  design: Design,
  targets: Readonly<Record<string, number>>,
  names: readonly string[],
): Candidate | null {
  const wanted = Object.entries(targets).map(([name, target]) => ({ index: names.indexOf(name), target }));
  let best: { readonly candidate: Candidate; readonly worst: number } | null = null;
  for (const candidate of grid) {
    const spreadOut = spread(design.covariance, candidate.row);
    const total = 1 + leverageOf(candidate.row, spreadOut);
    let worst = 0;
    for (const { index, target } of wanted) {
      const after = (design.covariance[index]?.[index] ?? Number.NaN) - (spreadOut[index] ?? 0) ** 2 / total;
      worst = Math.max(worst, after / target ** 2);
    }
    if (best === null || worst < best.worst) best = { candidate, worst };
  }
  return best?.candidate ?? null;
}

/** Null where the design leaves a parameter open or no freedom is left for an interval. */
function precisionOf(
  design: Design,
  { scatter, sharedRelative = 0, law, measure = "half-width" }: TargetRequest,
): Readonly<Record<string, number | null>> {
  const freedom = design.runs - 1 - law.parameters.length;
  return Object.fromEntries(
    Object.entries(standardErrorsOf(design, scatter)).map(([name, standardError]) => {
      if (standardError === null || freedom < 1) return [name, null];
      const total = name === "ln k" ? Math.hypot(standardError, sharedRelative) : standardError;
      if (measure === "standard-uncertainty") return [name, total];
      // Welch: the shared part is known, so degrees of freedom grow with its share.
      const effective = freedom * (total / standardError) ** 4;
      return [name, total * studentTFactor(law.level, effective)];
    }),
  );
}

/** What no number of runs lowers. */
function floorFault({
  law,
  targets,
  sharedRelative = 0,
  measure = "half-width",
}: TargetRequest): string | null {
  const target = targets["ln k"];
  if (target === undefined) return null;
  const factor = measure === "half-width" ? studentTFactor(law.level, Number.POSITIVE_INFINITY) : 1;
  const floor = sharedRelative * factor;
  return floor < target
    ? null
    : `What all runs share (stocks, ε·l, temperature) alone gives ln k ± ${numberInWords(Number(floor.toPrecision(2)))}, so no number of runs reaches ± ${numberInWords(target)}. Make a new stock, or calibrate better.`;
}

function faultOf(
  { law, feasible, scatter, targets, made }: TargetRequest,
  names: readonly string[],
): Extract<TargetResult, { readonly status: "bad-input" }> | null {
  const bad = (place: string, message: string) => ({ status: "bad-input", place, message }) as const;
  if (!(scatter > 0) || !Number.isFinite(scatter))
    return bad("scatter", `The scatter of ln v is ${scatter}; it must be above 0, for example 0.03 for 3 %.`);
  if (Object.keys(targets).length === 0)
    return bad("targets", `No precision is wanted of anything; name one or more of ${inARow(names)}.`);
  for (const [name, target] of Object.entries(targets)) {
    if (!names.includes(name))
      return bad(`targets.${name}`, `${name} is not a parameter of the law; it has ${inARow(names)}.`);
    if (!(target > 0))
      return bad(`targets.${name}`, `What is wanted for ${name} is ${target}; it must be above 0.`);
  }
  const missing = law.equation.species.find((name) => feasible.ranges[name] === undefined);
  if (missing !== undefined)
    return bad(`feasible.ranges.${missing}`, `There is no range of concentrations for ${missing}; give one.`);
  if (!recipeGrid(feasible).some((recipe) => isFeasible(feasible, recipe)))
    return bad("feasible", "No mixture lies within these ranges and volumes. Use stronger stocks.");
  const unknown = made.findIndex((recipe) =>
    law.equation.species.some((name) => !((recipe[name] ?? -1) >= 0)),
  );
  return unknown < 0 ? null : bad(`made.${unknown}`, `Run ${unknown + 1} lacks a concentration of the law.`);
}
