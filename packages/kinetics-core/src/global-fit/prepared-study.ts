import { COARSE_POINTS } from "./constants";
import type { CourseLaw } from "./course-law";

/** A study as the passes over its traces read it: typed arrays, the law bound to its species, parameters in one row. */

export interface PreparedRun {
  readonly label: string;
  /** In the order of the study's species. */
  readonly concentrations: Float64Array;
  readonly time: Float64Array;
  readonly signal: Float64Array;
  /** Distance of the times where they are equally spaced, else 0. */
  readonly spacing: number;
  readonly followedStart: number;
  /** Extents at which a product or a reactant is used up; ∓Number.MAX_VALUE where none is. */
  readonly least: number;
  readonly most: number;
  /** Extent that the trace shows, against which integration errors are measured. */
  readonly span: number;
  /** An end reading, with the variance 0 for one that is exact and null for one as good as a reading. */
  readonly endSignal: { readonly value: number; readonly variance: number | null } | null;
  /** Stated time of mixing and its variance; null where mixing is at zero exactly. */
  readonly timeZero: { readonly value: number; readonly variance: number } | null;
}

export interface PreparedStudy {
  readonly law: CourseLaw;
  readonly runs: readonly PreparedRun[];
  /** Stoichiometric number of the followed species. */
  readonly followedNumber: number;
  /** Stated ε·l; the parameter of the scale is the ratio to it. */
  readonly scale: number;
  /** Relative variance of ε·l; 0 where it is exact and no parameter. */
  readonly scaleVariance: number;
  /** Relative variance of a run's own departure from ε·l; 0 where runs share it exactly. */
  readonly scaleDeviationVariance: number;
  readonly hasTimeZero: boolean;
}

/** Parameters θ: ln k, the free parameters of the law, then the scale's ratio to the stated one if it is free. */
export function parameterCount(study: PreparedStudy): number {
  return 1 + study.law.free.length + (study.scaleVariance > 0 ? 1 : 0);
}

/** Place of the scale's ratio in θ, or −1. */
export function scalePlace(study: PreparedStudy): number {
  return study.scaleVariance > 0 ? 1 + study.law.free.length : -1;
}

/** The same study with evenly picked points, first and last included. A view of the same noise, so equally unbiased. */
export function thinned(study: PreparedStudy, points = COARSE_POINTS): PreparedStudy {
  return { ...study, runs: study.runs.map((run) => thinnedRun(run, points)) };
}

function thinnedRun(run: PreparedRun, points: number): PreparedRun {
  const all = run.time.length;
  if (all <= 2 * points) return run;
  const time = new Float64Array(points);
  const signal = new Float64Array(points);
  for (let i = 0; i < points; i++) {
    const from = Math.round((i * (all - 1)) / (points - 1));
    time[i] = run.time[from] ?? 0;
    signal[i] = run.signal[from] ?? 0;
  }
  return { ...run, time, signal, spacing: spacingOf(time) };
}

/** A clock that strays from equal distances by less than this part of one counts as even. */
const EVEN = 1e-6;

/** Distance of equally spaced times; 0 where they are not. */
export function spacingOf(time: Float64Array): number {
  const count = time.length;
  const first = time[0] ?? 0;
  const spacing = ((time[count - 1] ?? 0) - first) / (count - 1);
  const most = EVEN * spacing;
  for (let i = 1; i < count; i++) if (Math.abs((time[i] ?? 0) - first - i * spacing) > most) return 0;
  return spacing;
}
