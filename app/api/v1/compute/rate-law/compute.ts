import type { Estimate } from "kinetics-core/quantities";
import { fitRateLaw, type RateConstant, type RateLawFit, type RateLawResult } from "kinetics-core/rate-law";
import type { Computed } from "../estimate.schema";
import type { RateLawRequest, RateLawResponse } from "./schema";

type Fault = { readonly path: string; readonly message: string };

/** The public face of `fitRateLaw`: places at fault are named before anything is computed. */
export function computeRateLaw(request: RateLawRequest): Computed<RateLawResponse> {
  const faults = faultsOf(request);
  return faults.length > 0 ? { ok: false, errors: faults } : rateLawAnswer(fitRateLaw(request));
}

export function rateLawAnswer(result: RateLawResult): Computed<RateLawResponse> {
  if (result.status === "fitted") return { ok: true, answer: answerOf(result) };
  return {
    ok: false,
    errors: [{ path: result.status === "no-species" ? "species" : "runs", message: result.message }],
  };
}

/** What the schema cannot see: names that do not agree. */
export function faultsOf(request: RateLawRequest): Fault[] {
  const faults: Fault[] = [];
  const known = new Set(request.species);
  if (known.size < request.species.length) {
    faults.push({ path: "species", message: "A species stands here twice; name each once." });
  }
  const labels = new Map<string, number>();
  request.runs.forEach((run, index) => {
    const twin = labels.get(run.label);
    if (twin !== undefined) {
      faults.push({
        path: `runs.${index}.label`,
        message: `“${run.label}” is already the label of run ${twin + 1}.`,
      });
    }
    labels.set(run.label, index);
    for (const species of known) {
      if (run.concentrations[species] === undefined) {
        faults.push({
          path: `runs.${index}.concentrations.${species}`,
          message: `Run ${run.label} has no concentration of ${species}.`,
        });
      }
    }
  });
  request.shared?.forEach((term, index) => {
    term.species.forEach((species, place) => {
      if (!known.has(species)) {
        faults.push({
          path: `shared.${index}.species.${place}`,
          message: `${species} is not among the species.`,
        });
      }
    });
    term.runs?.forEach((label, place) => {
      if (!labels.has(label)) {
        faults.push({ path: `shared.${index}.runs.${place}`, message: `No run is labelled ${label}.` });
      }
    });
  });
  for (const species of Object.keys(request.orders ?? {})) {
    if (!known.has(species))
      faults.push({ path: `orders.${species}`, message: `${species} is not among the species.` });
  }
  return faults;
}

function answerOf(fit: RateLawFit): RateLawResponse {
  const orders: RateLawResponse["orders"] = {};
  for (const [species, order] of Object.entries(fit.orders)) orders[species] = plain(order);
  return {
    orders,
    rateConstant: plainConstant(fit.rateConstant),
    logRateConstant: plain(fit.logRateConstant),
    centre: { concentrations: { ...fit.centre.concentrations }, rate: plain(fit.centre.rate) },
    covariance: fit.covariance?.map((row) => [...row]) ?? null,
    budget: fit.budget.map((line) => ({ source: line.source, relative: line.relative })),
    betweenRunStandardDeviation: fit.betweenRunStandardDeviation,
    degreesOfFreedom: fit.degreesOfFreedom,
    separable: fit.separable,
    undetermined: fit.undetermined.map((one) => ({
      combination: { ...one.combination },
      message: one.message,
    })),
    simpleOrders: {
      orders: { ...fit.simpleOrders.orders },
      reading: { ...fit.simpleOrders.reading },
      rateConstant: plainConstant(fit.simpleOrders.rateConstant),
    },
    pairs: fit.pairs.map((pair) => ({
      runs: [...pair.runs],
      species: pair.species,
      order: plain(pair.order),
    })),
    flags: fit.flags.map((flag) => ({ ...flag })),
  };
}

function plain(one: Estimate) {
  const interval: [number, number] | null = one.interval === null ? null : [...one.interval];
  return { estimate: one.estimate, standardError: one.standardError, interval, level: one.level };
}

function plainConstant(one: RateConstant) {
  return { ...plain(one), unit: one.unit };
}
