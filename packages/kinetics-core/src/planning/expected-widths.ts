import type { RandomDraws } from "kinetics-core/random";
import { fitRateLaw, type RateLawInput } from "kinetics-core/rate-law";

export interface WidthRequest {
  /** The planned study: recipes with the uncertainties that will be stated; its rates are not used. */
  readonly design: RateLawInput;
  /** The law as fitted so far, taken as true. */
  readonly logRateConstant: number;
  readonly orders: Readonly<Record<string, number>>;
  /** τ: standard deviation of ln v between runs, as fitted. */
  readonly scatter: number;
  readonly draws: RandomDraws;
  /** Simulated studies; default 300. */
  readonly replicates?: number;
  /** After each simulated study, with the part that is done, up to 1. */
  readonly progress?: (part: number) => void;
  /** Asked before each; true ends the simulation and what was reached is reported. */
  readonly shouldStop?: () => boolean;
}

export interface ExpectedWidth {
  /** Of the half-widths over the simulated studies: the middle, and what four of five stay below. */
  readonly median: number;
  readonly fourOfFive: number;
}

export interface ExpectedWidths {
  readonly status: "simulated" | "stopped";
  /** Studies that were simulated and gave an interval for everything. */
  readonly replicates: number;
  /** Simulated studies that gave no interval. */
  readonly withoutInterval: number;
  readonly orders: Readonly<Record<string, ExpectedWidth>>;
  /** Of ln k: 0.05 is about ± 5 % of k. */
  readonly logRateConstant: ExpectedWidth;
}

export type WidthResult =
  | ExpectedWidths
  | { readonly status: "no-interval" | "bad-input"; readonly place: string; readonly message: string };

const REPLICATES = 300;
const FOUR_OF_FIVE = 0.8;

/**
 * How wide the intervals of a planned study will be, by simulating it with the scatter and the stated errors as they
 * are and fitting each simulated study by the library's own rule, so that few degrees of freedom and uneven errors
 * count as they will. Width varies from study to study, so its middle and its upper part are given.
 */
export function expectedWidths(request: WidthRequest): WidthResult {
  const { design, draws, replicates = REPLICATES, progress, shouldStop } = request;
  const fault = faultOf(request);
  if (fault !== null) return fault;
  const halves = new Map<string, number[]>(["", ...design.species].map((name) => [name, []]));
  let withoutInterval = 0;
  let complete = 0;
  let done = 0;
  for (; done < replicates && shouldStop?.() !== true; done++) {
    const widths = halfWidthsOf(simulated(request, draws));
    if (widths === null) withoutInterval++;
    else {
      complete++;
      for (const [name, width] of widths) halves.get(name)?.push(width);
    }
    progress?.((done + 1) / replicates);
  }
  if (complete === 0)
    return {
      status: "no-interval",
      place: "design.runs",
      message:
        done === 0
          ? "The simulation was stopped before its first study, so nothing is known of the widths."
          : `None of ${done} simulated studies gave an interval for every order: the design has too few runs or leaves orders open. Add runs that vary one species alone.`,
    };
  const widthOf = (name: string): ExpectedWidth => {
    const sorted = [...(halves.get(name) ?? [])].sort((a, b) => a - b);
    return { median: quantile(sorted, 0.5), fourOfFive: quantile(sorted, FOUR_OF_FIVE) };
  };
  return {
    status: done < replicates ? "stopped" : "simulated",
    replicates: complete,
    withoutInterval,
    orders: Object.fromEntries(design.species.map((name) => [name, widthOf(name)])),
    logRateConstant: widthOf(""),
  };
}

function simulated(
  { design, logRateConstant, orders, scatter }: WidthRequest,
  draws: RandomDraws,
): RateLawInput {
  const shared = design.shared ?? [];
  const errors = shared.map((one) => one.relative * draws.normal());
  const runs = design.runs.map((run) => {
    let logarithm = logRateConstant + scatter * draws.normal();
    for (const name of design.species) {
      const order = orders[name] ?? 0;
      if (order === 0) continue;
      const missed = (run.relativeUncertainty?.[name] ?? 0) * draws.normal();
      const common = shared.reduce((sum, one, k) => {
        const applies = one.species.includes(name) && (one.runs?.includes(run.label) ?? true);
        return applies ? sum + (errors[k] ?? 0) * (one.factors?.[run.label]?.[name] ?? 1) : sum;
      }, 0);
      logarithm += order * (Math.log(run.concentrations[name] ?? Number.NaN) + missed + common);
    }
    shared.forEach((one, k) => {
      if (one.onRate === true && (one.runs?.includes(run.label) ?? true)) logarithm += errors[k] ?? 0;
    });
    const rate = Math.exp(logarithm);
    const relative = (run.rateStandardError ?? 0) / run.rate;
    return relative > 0
      ? { ...run, rate: rate * (1 + relative * draws.normal()), rateStandardError: relative * rate }
      : { ...run, rate };
  });
  return { ...design, runs };
}

/** Half-width of ln k under "", of each order under its species; null where one has no interval. */
function halfWidthsOf(input: RateLawInput): readonly (readonly [string, number])[] | null {
  const fit = fitRateLaw(input);
  if (fit.status !== "fitted") return null;
  const estimates = [
    ["", fit.logRateConstant] as const,
    ...input.species.map((name) => [name, fit.orders[name]] as const),
  ];
  const widths = estimates.flatMap(([name, estimate]) => {
    // A held order is known exactly.
    if (typeof input.orders?.[name] === "number") return [[name, 0] as const];
    const interval = estimate?.interval ?? null;
    return interval === null ? [] : [[name, (interval[1] - interval[0]) / 2] as const];
  });
  return widths.length === estimates.length ? widths : null;
}

/** Of sorted values, by linear interpolation between neighbours. */
function quantile(sorted: readonly number[], part: number): number {
  const place = part * (sorted.length - 1);
  const below = sorted[Math.floor(place)] ?? Number.NaN;
  const above = sorted[Math.ceil(place)] ?? Number.NaN;
  return below + (place - Math.floor(place)) * (above - below);
}

function faultOf({
  design,
  logRateConstant,
  orders,
  scatter,
  replicates = REPLICATES,
}: WidthRequest): Extract<WidthResult, { readonly place: string }> | null {
  const bad = (place: string, message: string) => ({ status: "bad-input", place, message }) as const;
  if (!(scatter >= 0) || !Number.isFinite(scatter))
    return bad("scatter", `The scatter between runs is ${scatter}; it must be 0 or above.`);
  if (!Number.isFinite(logRateConstant))
    return bad("logRateConstant", `ln k is ${logRateConstant}; it must be a finite number.`);
  if (!(Number.isInteger(replicates) && replicates >= 1))
    return bad("replicates", `${replicates} studies were to be simulated; it takes a whole number from 1.`);
  const open = design.species.find((name) => !Number.isFinite(orders[name] ?? Number.NaN));
  return open === undefined
    ? null
    : bad(`orders.${open}`, `The order in ${open} is not given; the simulation needs one for every species.`);
}
