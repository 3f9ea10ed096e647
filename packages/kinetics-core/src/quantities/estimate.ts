/**
 * The three shapes in which the library speaks about a number: what it is, how well it is known, and
 * what a reader should beware of. Uncertainty follows the GUM (JCGM 100:2008): `standardUncertainty` and
 * `standardError` are one standard deviation, an interval names its level.
 */

/** A quantity with its standard uncertainty, both in one unit. `standardUncertainty: 0` means exact. */
export interface Uncertain {
  readonly value: number;
  readonly standardUncertainty: number;
}

/** What data say about one parameter. `null` where they cannot say it; never NaN, never a made-up zero. */
export interface Estimate {
  readonly estimate: number | null;
  readonly standardError: number | null;
  readonly interval: readonly [number, number] | null;
  /** Confidence level of `interval`, 0.95 unless asked otherwise. */
  readonly level: number;
}

export type Severity = "blocks" | "weakens" | "note";

/** A finding about the input or the result: `message` is one sentence that names the place and the way out. */
export interface Flag {
  readonly code: string;
  readonly severity: Severity;
  readonly message: string;
}
