import type { GlobalFit } from "kinetics-core/global-fit";
import { median } from "kinetics-core/summation";
import { type Agreement, type Answer, agreementOf, answerOfPeer } from "./agreement";
import { type BenchmarkStudy, TRUE_LOG_RATE_CONSTANT } from "./benchmark-study";
import { floorLoop } from "./floor";
import { fitOrThrow, inputOf } from "./our-fit";
import { Peer, type PeerFit } from "./peer";
import { leastTimeOf, timeOf } from "./stopwatch";

/** Rounds of one fit after another by everybody, so that a busy moment of the machine strikes all alike. */
const ROUNDS = 15;
/** Repeats of ours and of the floor in a round, which are the shortest. */
const REPEATS = 9;
/** Until the compiler has settled. */
const WARM_UPS = 60;

/**
 * `everySo`: rounds from one fit of a slow peer to its next. `repeats`: fits in a round, of which the least counts, against
 * the least of ours; one long fit meets its share of interruptions and is held against the mean of ours.
 */
export const PEERS = {
  numpy: { script: "same_model_numpy.py", argument: null, everySo: 1, repeats: 5 },
  lsoda: { script: "same_model_lsoda.py", argument: null, everySo: 1, repeats: 3 },
  odeint: { script: "same_model_lsoda.py", argument: "odeint", everySo: 1, repeats: 5 },
  naive: { script: "naive_lsoda.py", argument: null, everySo: 5, repeats: 1 },
} as const;
export type PeerName = keyof typeof PEERS;
const PEER_NAMES = ["numpy", "lsoda", "odeint", "naive"] as const satisfies readonly PeerName[];

export interface PeerRatio {
  /** How many times slower than ours: median over the rounds. */
  readonly ratio: number;
  readonly milliseconds: number;
  readonly fits: number;
  /** The same of the peer's processor time alone, to the least time of ours: what a busy machine leaves of the ratio. */
  readonly processorRatio: number;
  /** Part of the time in which it waited for a processor: on a busy machine longer fits wait more, and ratios rise. */
  readonly waiting: number;
  readonly agreement: Agreement;
}

export interface Ratios {
  readonly rounds: number;
  readonly milliseconds: number;
  /** How many times slower we are than the bare loop. */
  readonly floor: number;
  readonly floorMilliseconds: number;
  /** Null where python3 with its packages is absent. */
  readonly peers: Readonly<Record<PeerName, PeerRatio>> | null;
}

interface Round {
  readonly ours: number;
  readonly oursOnAverage: number;
  readonly floor: number;
  readonly peers: ReadonlyMap<PeerName, PeerFit>;
}

export async function measureRatios(
  study: BenchmarkStudy,
  withPeers: boolean,
  progress: (message: string) => void,
): Promise<Ratios> {
  const input = inputOf(study);
  const times = study.runs.map((run) => run.time);
  const fit = fitOrThrow(input);
  const measure = () => ({
    ...ownTimes(() => fitOrThrow(input)),
    floor: leastTimeOf(REPEATS, () => floorLoop(times, Math.exp(TRUE_LOG_RATE_CONSTANT))),
  });
  for (let i = 0; i < WARM_UPS / REPEATS; i++) measure();

  const started = new Map<PeerName, Peer>();
  try {
    for (const name of withPeers ? PEER_NAMES : []) started.set(name, await Peer.start(PEERS[name], study));
    for (const [name, peer] of started) if (PEERS[name].repeats > 1) await peer.fit();
    const rounds: Round[] = [];
    for (let round = 0; round < ROUNDS; round++) {
      const peers = new Map<PeerName, PeerFit>();
      for (const [name, peer] of started)
        if (round % PEERS[name].everySo === 0) peers.set(name, await quickestFit(peer, PEERS[name].repeats));
      rounds.push({ ...measure(), peers });
      progress(`round ${round + 1} of ${ROUNDS}`);
    }
    return ratiosOf(rounds, fit, withPeers);
  } finally {
    for (const peer of started.values()) peer.stop();
  }
}

function ownTimes(fit: () => void) {
  const times = Array.from({ length: REPEATS }, () => timeOf(fit));
  return { ours: Math.min(...times), oursOnAverage: times.reduce((sum, time) => sum + time, 0) / REPEATS };
}

async function quickestFit(peer: Peer, repeats: number): Promise<PeerFit> {
  let quickest = await peer.fit();
  for (let i = 1; i < repeats; i++) {
    const fit = await peer.fit();
    if (fit.seconds < quickest.seconds) quickest = fit;
  }
  return quickest;
}

function ratiosOf(rounds: readonly Round[], fit: GlobalFit, withPeers: boolean): Ratios {
  const answer = answerOf(fit);
  const peer = (name: PeerName) => peerRatio(name, rounds, answer);
  return {
    rounds: rounds.length,
    milliseconds: median(rounds.map(({ ours }) => ours)),
    floor: median(rounds.map(({ ours, floor }) => ours / floor)),
    floorMilliseconds: median(rounds.map(({ floor }) => floor)),
    peers: withPeers
      ? { numpy: peer("numpy"), lsoda: peer("lsoda"), odeint: peer("odeint"), naive: peer("naive") }
      : null,
  };
}

function peerRatio(name: PeerName, rounds: readonly Round[], ours: Answer): PeerRatio {
  const fits = rounds.flatMap((round) => {
    const fit = round.peers.get(name);
    const time = PEERS[name].repeats > 1 ? round.ours : round.oursOnAverage;
    return fit === undefined ? [] : [{ fit, milliseconds: 1000 * fit.seconds, time, least: round.ours }];
  });
  const last = fits.at(-1);
  if (last === undefined) throw new Error(`${name} was never asked for a fit`);
  return {
    ratio: median(fits.map(({ milliseconds, time }) => milliseconds / time)),
    milliseconds: median(fits.map(({ milliseconds }) => milliseconds)),
    fits: fits.length,
    processorRatio: median(fits.map(({ fit, least }) => (1000 * fit.processorSeconds) / least)),
    waiting: median(fits.map(({ fit }) => Math.max(0, 1 - fit.processorSeconds / fit.seconds))),
    agreement: agreementOf(ours, answerOfPeer(last.fit)),
  };
}

function answerOf({ logRateConstant, orders, betweenRunStandardDeviation }: GlobalFit): Answer {
  const estimates = [logRateConstant, orders.A, orders.B];
  return {
    estimates: estimates.map((one) => one?.estimate ?? Number.NaN),
    standardErrors: estimates.map((one) => one?.standardError ?? Number.NaN),
    betweenRuns: betweenRunStandardDeviation ?? Number.NaN,
  };
}
