import {
  type ConcentrationUnit,
  type Estimate,
  exponentialOf,
  type Flag,
  noEstimate,
  rateConstantUnit,
  type TimeUnit,
} from "kinetics-core/quantities";
import { mean, sum } from "kinetics-core/summation";
import { addedVariables } from "./added-variables";
import { designOf, isDetermined } from "./design";
import { type FitSettings, fitOrders, type OrdersFit, separableBlocks } from "./fit-orders";
import { exactTableFlags, freedomFlags, readingFlags, scopeFlags } from "./law-flags";
import { leaveOneOut } from "./leave-one-out";
import { pairOrders } from "./pairs";
import type { RateLawFit, RateLawInput, RateLawResult, SimpleOrderReading } from "./rate-law";
import { refusedSize } from "./refused-sizes";
import { lackOfFit, lackOfFitFlags, replicateFlags, residualFlags, residualRows } from "./residual-checks";
import { separability, separation } from "./separability";
import { sharedErrors } from "./shared-errors";
import { nearestSimpleOrder, readSimpleOrder } from "./simple-orders";
import {
  covarianceOf,
  estimateOfFunctional,
  logRateConstantFunctional,
  orderFunctional,
  uncertaintyOf,
} from "./uncertainty";
import { heldOrders, type UsableRun, usableRuns } from "./usable-runs";

/**
 * Orders and rate constant of v = k Π c_i^{n_i} from initial rates, with their uncertainty and with what a reader
 * should beware of. Never throws on data: what cannot be said is null, and a flag names the run and the way out.
 *
 * Intervals are Student's t at `level`; that of k is back-transformed from ln k and so lopsided. With no degree of
 * freedom there is none. Shared errors that touch every run move k and never an order.
 *
 * `too-few-runs`: one usable run while an order is free. `no-positive-rates`: no run with a usable rate.
 * `no-species`: a law needs at least one concentration. `beyond-precision`: sizes that no double can weigh against
 * each other. Throws `RangeError` where `level` or `temperatureRelative`, which are settings and no data, are none.
 */
export function fitRateLaw(input: RateLawInput): RateLawResult {
  refuseSettings(input);
  if (input.species.length === 0)
    return {
      status: "no-species",
      message: "The law names no species, so there is no order to find. Name at least one.",
      flags: [],
    };
  const usable = usableRuns(input);
  const held = heldOrders(input);
  if (usable.runs.length === 0)
    return {
      status: "no-positive-rates",
      message:
        input.runs.length === 0
          ? "There is no run yet: runs at two or more levels of each species are needed."
          : "No run has a rate above zero with all its concentrations, so there is nothing to fit. Check the signs of the rates and the concentrations.",
      flags: usable.flags,
    };
  const refused = refusedSize(input, usable.runs);
  if (refused !== null) return { status: "beyond-precision", message: refused, flags: usable.flags };
  const free = held.filter((order) => order === null).length;
  if (usable.runs.length === 1 && free > 0)
    return {
      status: "too-few-runs",
      message: `${usable.runs[0]?.label ?? "One run"} alone gives one rate and no order. At least ${free + 1} runs are needed for ${free === 1 ? "one order" : `${free} orders`}, one more for an interval; or hold the orders.`,
      flags: usable.flags,
    };
  try {
    return fitUsable(input, usable.runs, usable.scale, held, usable.flags);
  } catch (error) {
    // Weights that differ by more than a double holds end in a singular matrix or a probability of NaN.
    if (!(error instanceof RangeError)) throw error;
    return {
      status: "beyond-precision",
      message:
        "The concentrations, rates or uncertainties of these runs differ by so many powers of ten that no law can be computed from them. Look for a wrong power of ten or a wrong unit.",
      flags: usable.flags,
    };
  }
}

function refuseSettings({ level = 0.95, temperatureRelative = 0 }: RateLawInput): void {
  if (!(level > 0 && level < 1))
    throw new RangeError(`level is ${level}; a confidence level lies between 0 and 1`);
  if (!(temperatureRelative >= 0 && Number.isFinite(temperatureRelative)))
    throw new RangeError(
      `temperatureRelative is ${temperatureRelative}; a relative uncertainty is 0 or more`,
    );
}

/** Settings every part of one analysis shares. */
interface Reporting {
  readonly species: readonly string[];
  readonly concentrationUnit: ConcentrationUnit;
  readonly timeUnit: TimeUnit;
  readonly level: number;
  readonly temperatureRelative: number;
}

function fitUsable(
  input: RateLawInput,
  runs: readonly UsableRun[],
  scale: "logarithmic" | "rate",
  held: readonly (number | null)[],
  runFlags: readonly Flag[],
): RateLawFit {
  const reporting: Reporting = {
    species: input.species,
    concentrationUnit: input.concentrationUnit ?? "mol/L",
    timeUnit: input.timeUnit ?? "s",
    level: input.level ?? 0.95,
    temperatureRelative: input.temperatureRelative ?? 0,
  };
  const shared = sharedErrors(input, runs);
  const design = designOf(runs, held);
  const hasBlocks = runs.some((run) => run.block !== null);
  const blocks = hasBlocks ? separableBlocks(runs, design) : [];
  const settings: FitSettings = { scale, shared: shared.errors, blocks: blocks ?? [] };
  const fit = fitOrders(runs, design, settings);

  const orders = input.species.map((_, i) => orderEstimate(fit, i, reporting.level));
  const constant = constantOf(fit, reporting);
  const centreRate = centreEstimate(fit, reporting);
  const measures = separability(runs, design, input.species);
  const separated = separation(
    { fit, species: input.species, unit: reporting.concentrationUnit, level: reporting.level },
    measures,
  );
  const simple = simpleLaw(runs, fit, orders, settings, reporting);
  const residuals = residualRows(fit);
  const lack = lackOfFit(fit);
  const pairs = pairOrders(runs, input.species, fit.orders, reporting.level);
  const without = leaveOneOut(fit, simple.fit, input.species);

  return {
    status: "fitted",
    scale,
    orders: byName(input.species, orders),
    rateConstant: { ...exponentialOf(constant.estimate), unit: constant.unit },
    logRateConstant: constant.estimate,
    centre: {
      concentrations: byName(
        input.species,
        input.species.map((_, i) => centreConcentration(runs, fit, i)),
      ),
      rate: exponentialOf(centreRate.estimate),
      budget: centreRate.budget,
    },
    covariance: covariance(fit, constant.estimate, orders, reporting),
    budget: constant.estimate.estimate === null ? centreRate.budget : constant.budget,
    betweenRunStandardDeviation: fit.betweenRuns === null ? null : Math.sqrt(fit.betweenRuns),
    betweenBlockStandardDeviation: fit.betweenBlocks === null ? null : Math.sqrt(fit.betweenBlocks),
    degreesOfFreedom: fit.degreesOfFreedom,
    rateConstantDegreesOfFreedom: constant.estimate.interval === null ? null : constant.degreesOfFreedom,
    separable: separated.undetermined.length === 0,
    separability: measures,
    undetermined: separated.undetermined,
    determined: separated.determined,
    simpleOrders: simple.report,
    pairs: pairs.pairs,
    residuals,
    lackOfFit: lack,
    addedVariables: addedVariables(
      fit,
      input.species,
      orders.map((order) => order.estimate),
    ),
    leaveOneOut: without,
    flags: [
      ...runFlags,
      ...shared.flags,
      ...scopeFlags(fit, hasBlocks && blocks === null),
      ...separated.flags,
      ...freedomFlags(fit),
      ...exactTableFlags(fit, simple.fit),
      ...residualFlags(fit, residuals),
      ...replicateFlags(fit),
      ...lackOfFitFlags(lack),
      ...readingFlags(input.species, orders, simple.report, without, fit),
      ...pairs.flags,
    ],
  };
}

function orderEstimate(fit: OrdersFit, species: number, level: number): Estimate {
  const held = fit.design.held[species] ?? null;
  if (held !== null) return { estimate: held, standardError: null, interval: null, level };
  const place = fit.design.free.indexOf(species);
  if (!isDetermined(fit.design, unitWeights(fit, place))) return noEstimate(level);
  return estimateOfFunctional(uncertaintyOf(fit, orderFunctional(fit, place), 0), 0, level);
}

function unitWeights(fit: OrdersFit, place: number): readonly number[] {
  return fit.design.free.map((_, i) => (i === place ? 1 : 0));
}

interface ConstantOf {
  readonly estimate: Estimate;
  readonly budget: RateLawFit["budget"];
  readonly degreesOfFreedom: number | null;
  readonly unit: string;
}

function constantOf(fit: OrdersFit, reporting: Reporting): ConstantOf {
  const { design } = fit;
  const overall = sum(fit.orders);
  const totalIsKnown = isDetermined(
    design,
    design.free.map(() => 1),
  );
  const unit = totalIsKnown ? rateConstantUnit(overall, reporting.concentrationUnit, reporting.timeUnit) : "";
  const meansAreEnough = isDetermined(
    design,
    design.free.map((species) => design.means[species] ?? 0),
  );
  const uncertainty = uncertaintyOf(fit, logRateConstantFunctional(fit), reporting.temperatureRelative);
  return {
    estimate: meansAreEnough
      ? estimateOfFunctional(uncertainty, 0, reporting.level)
      : noEstimate(reporting.level),
    budget: uncertainty.lines,
    degreesOfFreedom: uncertainty.degreesOfFreedom,
    unit,
  };
}

/** ln v at the centre of the design; the centre's true concentrations share the stocks' errors, so all terms count. */
function centreEstimate(
  fit: OrdersFit,
  reporting: Reporting,
): { readonly estimate: Estimate; readonly budget: RateLawFit["budget"] } {
  const functional = [1, ...Array.from({ length: fit.design.rank }, () => 0)];
  const uncertainty = uncertaintyOf(fit, functional, reporting.temperatureRelative);
  const held = fit.design.held.reduce<number>(
    (sum, order, i) => sum + (order ?? 0) * (fit.design.means[i] ?? 0),
    0,
  );
  return { estimate: estimateOfFunctional(uncertainty, held, reporting.level), budget: uncertainty.lines };
}

/** Geometric mean; where a run holds none of a species of order 0 the arithmetic mean, since the other is zero. */
function centreConcentration(runs: readonly UsableRun[], fit: OrdersFit, species: number): number {
  const values = runs.map((run) => run.concentrations[species] ?? 0);
  return values.every((value) => value > 0) ? Math.exp(fit.design.means[species] ?? 0) : mean(values);
}

function covariance(
  fit: OrdersFit,
  constant: Estimate,
  orders: readonly Estimate[],
  reporting: Reporting,
): RateLawFit["covariance"] {
  if (constant.estimate === null || orders.some((order) => order.estimate === null)) return null;
  const zeros = Array.from({ length: 1 + fit.design.rank }, () => 0);
  const functionals = orders.map((_, i) => {
    const place = fit.design.free.indexOf(i);
    return place < 0 ? zeros : orderFunctional(fit, place);
  });
  return covarianceOf(fit, [logRateConstantFunctional(fit), ...functionals], reporting.temperatureRelative);
}

/** The law with every free order held at the nearest simple one. */
function simpleLaw(
  runs: readonly UsableRun[],
  fit: OrdersFit,
  orders: readonly Estimate[],
  settings: FitSettings,
  reporting: Reporting,
): { readonly fit: OrdersFit | null; readonly report: RateLawFit["simpleOrders"] } {
  const { species, level } = reporting;
  const held = orders.map((order, i) => {
    if (order.estimate === null) return null;
    return fit.design.held[i] ?? nearestSimpleOrder(order.estimate);
  });
  const reading = orders.map((order, i): SimpleOrderReading => {
    const isHeld = (fit.design.held[i] ?? null) !== null;
    return isHeld ? "nearest" : readSimpleOrder(order, fit.exact);
  });
  const known = species.flatMap((name, i) => {
    const order = held[i] ?? null;
    return order === null ? [] : [[name, order] as const];
  });
  const common = { orders: Object.fromEntries(known), reading: byName(species, reading) };
  if (known.length < species.length) {
    const none = noEstimate(level);
    return {
      fit: null,
      report: {
        ...common,
        rateConstant: { ...none, unit: "" },
        logRateConstant: none,
        budget: [],
        scatter: null,
      },
    };
  }
  const design = designOf(runs, held);
  const blocks = settings.blocks.length === 0 ? [] : (separableBlocks(runs, design) ?? []);
  const simple = fitOrders(runs, design, { ...settings, blocks });
  const constant = constantOf(simple, reporting);
  const freedom = simple.degreesOfFreedom;
  const sumOfSquares = simple.residuals.reduce((sum, residual) => sum + residual ** 2, 0);
  return {
    fit: simple,
    report: {
      ...common,
      rateConstant: { ...exponentialOf(constant.estimate), unit: constant.unit },
      logRateConstant: constant.estimate,
      budget: constant.budget,
      scatter: freedom > 0 ? Math.sqrt(sumOfSquares / freedom) : null,
    },
  };
}

function byName<T>(names: readonly string[], values: readonly T[]): Readonly<Record<string, T>> {
  return Object.fromEntries(
    names.flatMap((name, i) => {
      const value = values[i];
      return value === undefined ? [] : [[name, value] as const];
    }),
  );
}
