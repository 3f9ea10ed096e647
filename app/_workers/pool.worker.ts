import { fitGlobalAndCompareEnds, type GlobalFitInput, type GlobalFitResult } from "kinetics-core/global-fit";
import {
  estimateInitialRate,
  type InitialRate,
  type InitialRateOptions,
  type SlopeAtEnd,
  type StudyTrace,
  slopeAgainstWindowEnd,
  surveyTrace,
  type Trace,
  type TraceSurvey,
} from "kinetics-core/initial-rate";
import {
  fitIntegratedLaw,
  type IntegratedLawInput,
  type IntegratedLawResult,
} from "kinetics-core/integrated";
import { fitRateLaw, type RateLawInput, type RateLawResult } from "kinetics-core/rate-law";
import type { Corrections } from "@/app/_import/corrections";
import { type ImportPreview, previewOf } from "@/app/_import/preview";
import { readFile } from "@/app/_import/read-file";
import type { Reading, StudyContext } from "@/app/_import/reading";

/** What the pool does. Workers read bytes and compute; only the main thread touches the database. */

export interface ReadTask {
  readonly bytes: Uint8Array;
  readonly context: StudyContext;
  readonly corrections: Corrections;
}

export function readUpload({ bytes, context, corrections }: ReadTask): Promise<Reading> {
  return readFile(bytes, context, corrections);
}

/** As `readUpload`, thinned for the page here, so that millions of readings need not cross between threads. */
export async function previewUpload({ bytes, context, corrections }: ReadTask): Promise<ImportPreview> {
  return previewOf(await readFile(bytes, context, corrections));
}

/** What one trace allows; of many readings this takes seconds. */
export function surveyLongTrace(trace: StudyTrace): TraceSurvey {
  return surveyTrace(trace);
}

export interface EstimateTask {
  readonly trace: Trace;
  readonly options: InitialRateOptions;
}

export function estimateLongTrace({ trace, options }: EstimateTask): InitialRate {
  return estimateInitialRate(trace, options);
}

export interface SweepTask {
  readonly trace: Trace;
  readonly options: Parameters<typeof slopeAgainstWindowEnd>[1];
}

export function sweepLongTrace({ trace, options }: SweepTask): SlopeAtEnd[] {
  return slopeAgainstWindowEnd(trace, options);
}

export function fitLargeLaw(input: RateLawInput): RateLawResult {
  return fitRateLaw(input);
}

export function fitLongTrace(input: IntegratedLawInput): IntegratedLawResult {
  return fitIntegratedLaw(input);
}

export function fitAllTraces(input: GlobalFitInput): GlobalFitResult {
  return fitGlobalAndCompareEnds(input);
}
