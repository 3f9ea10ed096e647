import type { PeerFit } from "./peer";

/** Two implementations are at the same answer when no parameter differs by more than this part of its standard error. */
export const TOLERANCE = 0.02;
/** Their standard errors and the scatter between runs differ by no more than this part. */
export const TOLERANCE_OF_ERRORS = 0.02;

/** What is compared: ln k and the two orders, each with its standard error, and the scatter between runs. */
export interface Answer {
  readonly estimates: readonly number[];
  readonly standardErrors: readonly number[];
  readonly betweenRuns: number;
}

export interface Agreement {
  readonly agrees: boolean;
  /** Largest difference of ln k and the orders, in standard errors of ours. */
  readonly inStandardErrors: number;
  /** Largest relative difference of standard errors and of the scatter between runs. */
  readonly ofErrors: number;
}

export function agreementOf(ours: Answer, peer: Answer): Agreement {
  const inStandardErrors = Math.max(
    ...ours.estimates.map(
      (estimate, i) =>
        Math.abs((peer.estimates[i] ?? Number.NaN) - estimate) / (ours.standardErrors[i] ?? Number.NaN),
    ),
  );
  const ofErrors = Math.max(
    Math.abs(peer.betweenRuns / ours.betweenRuns - 1),
    ...ours.standardErrors.map((error, i) => Math.abs((peer.standardErrors[i] ?? Number.NaN) / error - 1)),
  );
  return {
    agrees: inStandardErrors <= TOLERANCE && ofErrors <= TOLERANCE_OF_ERRORS,
    inStandardErrors,
    ofErrors,
  };
}

export function answerOfPeer(fit: PeerFit): Answer {
  return {
    estimates: [fit.logRateConstant, ...fit.orders],
    standardErrors: fit.standardErrors.slice(0, 1 + fit.orders.length),
    betweenRuns: fit.betweenRuns,
  };
}
