import type { GlobalFit, GlobalFitInput } from "kinetics-core/global-fit";
import { powerEquation, type RateEquation } from "kinetics-core/rate-equation";
import type { FittedLaw, LawOfFit } from "./fitted-law";

/**
 * The law of a fit to traces, with what the fit says of its free parameters; held ones are exact. The scale of the
 * signal, which is fitted too, enters no prediction in concentrations and is left out of the covariance.
 */
export function lawOfTraces(fit: GlobalFit, input: GlobalFitInput): LawOfFit {
  const { equation, places, held } = layoutOf(input);
  const logRateConstant = fit.logRateConstant.estimate;
  const values = places.map((name, i) => held[i] ?? fit.parameters[name]?.estimate ?? null);
  const open = places.filter((_, i) => values[i] === null);
  if (logRateConstant === null || open.length > 0)
    return {
      status: "not-determined",
      message: `The traces do not determine ${["ln k", ...open].at(logRateConstant === null ? 0 : 1)}, so nothing can be predicted from this law. Hold it, or make runs that show it.`,
    };
  const rows = ["ln k", ...places].map((name, i) =>
    i > 0 && held[i - 1] !== null ? -1 : fit.parameterNames.indexOf(name),
  );
  return {
    status: "law",
    law: {
      equation,
      logRateConstant,
      parameters: values.map((value) => value ?? Number.NaN),
      covariance:
        fit.covariance === null
          ? null
          : rows.map((row) => rows.map((column) => fit.covariance?.[row]?.[column] ?? 0)),
      degreesOfFreedom: fit.degreesOfFreedom > 0 ? fit.degreesOfFreedom : null,
      betweenRunStandardDeviation: fit.betweenRunStandardDeviation,
      studied: studiedIn(input, equation),
      level: fit.logRateConstant.level,
    },
  };
}

interface Layout {
  readonly equation: RateEquation;
  /** Name in the fit of each parameter of the equation. */
  readonly places: readonly string[];
  /** Its held value; null where it is free. */
  readonly held: readonly (number | null)[];
}

function layoutOf({ law }: GlobalFitInput): Layout {
  if ("equation" in law) {
    const places = law.equation.parameters.map(({ name }) => name);
    return { equation: law.equation, places, held: places.map((name) => law.held?.[name] ?? null) };
  }
  const species = Object.keys(law.orders);
  const orders = species.map((name) => law.orders[name] ?? "free");
  const places = species.filter((_, i) => orders[i] === "free");
  return { equation: powerEquation(species, orders), places, held: places.map(() => null) };
}

function studiedIn({ runs }: GlobalFitInput, { species }: RateEquation): FittedLaw["studied"] {
  return Object.fromEntries(
    species.map((name) => {
      const values = runs.map((run) => run.concentrations[name] ?? Number.NaN);
      return [name, [Math.min(...values), Math.max(...values)] as const];
    }),
  );
}
