import type { z } from "zod";
import { acceptedInWords } from "@/app/_server/accepted-in-words";
import { fieldMessages } from "@/app/_server/problem";
import { isQuickFit } from "@/app/_worksheet/quick-fit";
import { computeCalibration } from "./calibration/compute";
import { calibrationRequest, calibrationResponse } from "./calibration/schema";
import type { Computed } from "./estimate.schema";
import { computeGlobalFit } from "./global-fit/compute";
import { globalFitRequest, globalFitResponse } from "./global-fit/schema";
import { computeInitialRate } from "./initial-rate/compute";
import { initialRateRequest, initialRateResponse } from "./initial-rate/schema";
import { computeIntegratedLaw } from "./integrated-law/compute";
import { integratedLawRequest, integratedLawResponse } from "./integrated-law/schema";
import { computeRateLaw } from "./rate-law/compute";
import { rateLawRequest, rateLawResponse } from "./rate-law/schema";
import { computeSaturation } from "./saturation/compute";
import { saturationRequest, saturationResponse } from "./saturation/schema";
import { computeTemperature } from "./temperature/compute";
import { temperatureRequest, temperatureResponse } from "./temperature/schema";

/** One computation of the public API: what comes in, what goes out, and the face over the library between them. */
export interface Computation<Request extends z.ZodType = z.ZodType, Response extends z.ZodType = z.ZodType> {
  readonly name: string;
  readonly summary: string;
  readonly request: Request;
  readonly response: Response;
  readonly compute: (request: z.output<Request>) => Computed<z.input<Response>>;
  /** Done in some hundredths of a second; the rest goes to the pool. Absent: whatever the schema lets through is quick. */
  readonly isQuick?: (request: z.output<Request>) => boolean;
}

const QUICK_READINGS = 5000;

function computation<Request extends z.ZodType, Response extends z.ZodType>(
  entry: Computation<Request, Response>,
): Computation<Request, Response> {
  return entry;
}

export const calibrationComputation = computation({
  name: "calibration",
  summary: "Calibration line with its curvature, linear range and limits, and concentrations read from it.",
  request: calibrationRequest,
  response: calibrationResponse,
  compute: computeCalibration,
});

export const globalFitComputation = computation({
  name: "global-fit",
  summary: "One rate law fitted to all traces at once, with scatter of the rate constant between runs.",
  request: globalFitRequest,
  response: globalFitResponse,
  compute: computeGlobalFit,
  isQuick: ({ runs }) => runs.reduce((sum, { time }) => sum + time.length, 0) <= QUICK_READINGS,
});

export const initialRateComputation = computation({
  name: "initial-rate",
  summary: "Initial rate of one trace, with its window, its noise and the other estimators beside it.",
  request: initialRateRequest,
  response: initialRateResponse,
  compute: computeInitialRate,
  isQuick: ({ time, signal }) => Math.max(time.length, signal.length) <= QUICK_READINGS,
});

/** Every reading is passed some dozens of times, once for each step of each search. */
const QUICK_COURSE_READINGS = 2000;

export const integratedLawComputation = computation({
  name: "integrated-law",
  summary: "Order, rate constant, start, end and half-life of one trace by its integrated rate law.",
  request: integratedLawRequest,
  response: integratedLawResponse,
  compute: computeIntegratedLaw,
  isQuick: ({ time, signal }) => Math.max(time.length, signal.length) <= QUICK_COURSE_READINGS,
});

export const rateLawComputation = computation({
  name: "rate-law",
  summary: "Orders and rate constant from initial rates, with intervals and an uncertainty budget.",
  request: rateLawRequest,
  response: rateLawResponse,
  compute: computeRateLaw,
  isQuick: isQuickFit,
});

export const saturationComputation = computation({
  name: "saturation",
  summary: "Limiting rate and half-saturation concentration from initial rates, with profile intervals.",
  request: saturationRequest,
  response: saturationResponse,
  compute: computeSaturation,
});

export const temperatureComputation = computation({
  name: "temperature",
  summary:
    "Activation energy, enthalpy and entropy of activation from rate constants at several temperatures.",
  request: temperatureRequest,
  response: temperatureResponse,
  compute: computeTemperature,
});

/** A request checked against the schema of its computation, then computed; faults carry the path of their place. */
export function runComputation<Request extends z.ZodType, Response extends z.ZodType>(
  entry: Computation<Request, Response>,
  body: unknown,
): Computed<z.input<Response>> {
  const parsed = entry.request.safeParse(body, { error: acceptedInWords });
  if (!parsed.success) return { ok: false, errors: fieldMessages(parsed.error) };
  return entry.compute(parsed.data);
}

/** Every computation: its path in the description and its name on the command line follow from this list. */
export const COMPUTATIONS: readonly Computation[] = [
  calibrationComputation,
  globalFitComputation,
  initialRateComputation,
  integratedLawComputation,
  rateLawComputation,
  saturationComputation,
  temperatureComputation,
];

/** By the last segment of their path. */
export const COMPUTATION_NAMES = COMPUTATIONS.map((entry) => entry.name);

export function computeByName(name: string, body: unknown): Computed<unknown> | undefined {
  const entry = COMPUTATIONS.find((one) => one.name === name);
  return entry === undefined ? undefined : runComputation(entry, body);
}
