import type { Estimate, Flag } from "kinetics-core/quantities";
import { powerEquation, type RateEquation } from "kinetics-core/rate-equation";
import type { RateLawFit } from "kinetics-core/rate-law";

/**
 * A fitted rate law as predictions need it: the equation, where its parameters stand and how well they are known
 * together. Results of every fit map to it; concentrations and times are in the units of that fit.
 */
export interface FittedLaw {
  readonly equation: RateEquation;
  readonly logRateConstant: number;
  /** In the order of `equation.parameters`. */
  readonly parameters: readonly number[];
  /** Of ln k, then the parameters. Null where the fit gives no uncertainty. */
  readonly covariance: readonly (readonly number[])[] | null;
  /** Behind the covariance; null where no interval can be given. */
  readonly degreesOfFreedom: number | null;
  /**
   * Behind τ: runs less parameters. Where stated errors carry most of the covariance its own degrees of freedom are
   * many, yet τ is known from few runs. Absent: those of the covariance.
   */
  readonly runDegreesOfFreedom?: number | null;
  /** τ: standard deviation of ln k from run to run. Null where it is not known; a new run then has no interval. */
  readonly betweenRunStandardDeviation: number | null;
  /** Lowest and highest concentration of each species among the runs; empty where they are not known. */
  readonly studied: Readonly<Record<string, readonly [number, number]>>;
  readonly level: number;
}

export type LawOfFit =
  | { readonly status: "law"; readonly law: FittedLaw }
  | { readonly status: "not-determined"; readonly message: string };

/**
 * The power law of a fit to rates. `free` carries the orders as fitted, with their covariance; `simple` holds them at
 * the nearest simple values, whose own doubt then enters no prediction.
 */
export function lawOfRates(fit: RateLawFit, orders: "free" | "simple" = "free"): LawOfFit {
  return orders === "free" ? lawWithFreeOrders(fit) : lawWithSimpleOrders(fit);
}

function lawWithFreeOrders(fit: RateLawFit): LawOfFit {
  const species = Object.keys(fit.orders);
  const orders = species.map((name) => fit.orders[name]?.estimate ?? null);
  const logRateConstant = fit.logRateConstant.estimate;
  const open = species.filter((_, i) => orders[i] === null);
  if (open.length > 0 || logRateConstant === null) return notDetermined(open);
  const values = orders.map((order) => order ?? Number.NaN);
  // A held order stays held here, so that a species of order 0 may be absent.
  const held = new Set(fit.addedVariables.flatMap((one) => (one.held ? [one.species] : [])));
  const places = species.flatMap((name, i) => (held.has(name) ? [] : [i]));
  const kept = [0, ...places.map((i) => i + 1)];
  return {
    status: "law",
    law: {
      equation: powerEquation(
        species,
        values.map((order, i) => (places.includes(i) ? "free" : order)),
      ),
      logRateConstant,
      parameters: places.map((i) => values[i] ?? Number.NaN),
      covariance:
        fit.covariance === null
          ? null
          : kept.map((row) => kept.map((column) => fit.covariance?.[row]?.[column] ?? Number.NaN)),
      degreesOfFreedom: fit.rateConstantDegreesOfFreedom,
      runDegreesOfFreedom: fit.degreesOfFreedom > 0 ? fit.degreesOfFreedom : null,
      betweenRunStandardDeviation: fit.betweenRunStandardDeviation,
      studied: studiedIn(fit),
      level: fit.logRateConstant.level,
    },
  };
}

function lawWithSimpleOrders(fit: RateLawFit): LawOfFit {
  const species = Object.keys(fit.orders);
  const { orders, logRateConstant, scatter } = fit.simpleOrders;
  const open = species.filter((name) => orders[name] === undefined);
  if (open.length > 0 || logRateConstant.estimate === null) return notDetermined(open);
  const { standardError } = logRateConstant;
  const freedom = fit.residuals.length - 1;
  return {
    status: "law",
    law: {
      equation: powerEquation(
        species,
        species.map((name) => orders[name] ?? Number.NaN),
      ),
      logRateConstant: logRateConstant.estimate,
      parameters: [],
      covariance: standardError === null ? null : [[standardError ** 2]],
      degreesOfFreedom: standardError === null || freedom < 1 ? null : freedom,
      betweenRunStandardDeviation: scatter,
      studied: studiedIn(fit),
      level: logRateConstant.level,
    },
  };
}

function notDetermined(open: readonly string[]): LawOfFit {
  return {
    status: "not-determined",
    message:
      open.length === 0
        ? "The runs do not determine the rate constant, so nothing can be predicted from this law."
        : `The runs do not determine the order in ${open.join(" and ")}, so nothing can be predicted from this law. Hold the order, or vary the species on its own.`,
  };
}

function studiedIn(fit: RateLawFit): FittedLaw["studied"] {
  return Object.fromEntries(
    fit.addedVariables.map(({ species, points }) => {
      const values = points.map((point) => point.concentration);
      return [species, [Math.min(...values), Math.max(...values)] as const];
    }),
  );
}

/** A quantity in logarithms with the variance that the law and, in `newRun`, a run's own scatter give it. */
export interface Prediction {
  /** What is known of the quantity itself: the law's uncertainty; interval back-transformed. */
  readonly ofTheLaw: Estimate;
  /** Where one new run would fall: + τ². Without τ nothing is said. */
  readonly newRun: Estimate;
  readonly flags: readonly Flag[];
}
