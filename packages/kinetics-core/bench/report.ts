import { TOLERANCE, TOLERANCE_OF_ERRORS } from "./agreement";
import type { Bootstrap } from "./measure-bootstrap";
import type { Expression } from "./measure-expression";
import type { Growth } from "./measure-growth";
import type { Memory } from "./measure-memory";
import type { PeerName, PeerRatio, Ratios } from "./measure-ratios";

export interface Benchmark {
  readonly ratios: Ratios;
  readonly expression: Expression;
  readonly growth: Growth;
  readonly bootstrap: Bootstrap;
  readonly memory: readonly Memory[];
  readonly versions: Readonly<Record<"node" | "python" | "numpy" | "scipy", string | null>>;
  /** Why the comparisons with Python are left out; null where they are made. */
  readonly absent: string | null;
}

/** Above this part of the time spent waiting the ratios are those of a busy machine. */
const MOST_WAITING = 0.1;
const BUSY = "the machine is busy and longer fits wait more, so the ratios are too high; peers waited up to";

const PEER_TITLES: Readonly<Record<PeerName, string>> = {
  numpy: "same algorithm, NumPy over all runs (same_model_numpy.py)",
  lsoda: "same algorithm, LSODA by solve_ivp (same_model_lsoda.py)",
  odeint: "same algorithm, LSODA by odeint (same_model_lsoda.py odeint)",
  naive: "all parameters at once, LSODA by solve_ivp (naive_lsoda.py)",
};

/** A peer that found something else is no yardstick. */
export function failuresOf({ ratios }: Benchmark): readonly string[] {
  return Object.entries(ratios.peers ?? {}).flatMap(([name, { agreement }]) =>
    agreement.agrees
      ? []
      : [
          `${name} is not at the same answer: ${agreement.inStandardErrors.toPrecision(2)} standard errors apart (${TOLERANCE} accepted), errors and scatter ${(100 * agreement.ofErrors).toPrecision(2)} % apart (${100 * TOLERANCE_OF_ERRORS} % accepted); it is not counted.`,
        ],
  );
}

export function jsonOf({ ratios, growth, ...rest }: Benchmark) {
  const counted = (name: PeerName) => {
    const peer = ratios.peers?.[name];
    return peer?.agreement.agrees === true ? peer.ratio : null;
  };
  return {
    ratio: {
      numpy: counted("numpy"),
      lsoda: counted("lsoda"),
      naive: counted("naive"),
      floor: ratios.floor,
    },
    growth,
    beside: { odeint: counted("odeint") },
    rounds: ratios.rounds,
    milliseconds: {
      fit: ratios.milliseconds,
      floor: ratios.floorMilliseconds,
      ...ofPeers(ratios, ({ milliseconds }) => milliseconds),
    },
    waiting: ofPeers(ratios, ({ waiting }) => waiting),
    processorRatio: ofPeers(ratios, ({ processorRatio }) => processorRatio),
    agreement: {
      tolerance: TOLERANCE,
      toleranceOfErrors: TOLERANCE_OF_ERRORS,
      ...Object.fromEntries(Object.entries(ratios.peers ?? {}).map(([name, peer]) => [name, peer.agreement])),
    },
    ...rest,
  };
}

function ofPeers<T>({ peers }: Ratios, of: (peer: PeerRatio) => T): Readonly<Record<string, T>> {
  return Object.fromEntries(Object.entries(peers ?? {}).map(([name, peer]) => [name, of(peer)]));
}

export function tableOf({
  ratios,
  expression,
  growth,
  bootstrap,
  memory,
  versions,
  absent,
}: Benchmark): string {
  const { node, python, numpy, scipy } = versions;
  const python3 = python === null ? (absent ?? "") : `Python ${python}, NumPy ${numpy}, SciPy ${scipy}`;
  const rows: (readonly [string, string, string])[] = [
    ["one fit", `${ratios.milliseconds.toFixed(2)} ms`, ""],
    ["six exponentials a point, times slower than", ratios.floor.toFixed(2), "at most 2.5"],
    ...Object.entries(ratios.peers ?? {}).map(([name, peer]) => peerRow(name, peer)),
    ["a user's expression over the built-in law", expression.ratio.toFixed(2), "at most 2"],
    ["cost a run, 120 runs over 12", growth.runs.toFixed(3), "at most 1.15"],
    ["cost a point, 10,000 points over 1,000", growth.points.toFixed(3), "at most 1.15"],
    [
      `${bootstrap.refits} refits of a bootstrap over as many single fits (${bootstrap.seconds.toFixed(1)} s, ${bootstrap.failed} failed, stopped after ${bootstrap.stoppedAfter})`,
      bootstrap.ratio.toFixed(2),
      "at most 1",
    ],
    ...memory.map(
      (one) =>
        [
          `peak memory of a fit beside ${one.data.toFixed(2)} MiB of readings (${one.runs} runs of ${one.readings}): heap, external, resident; retained`,
          `${[one.peakHeap, one.peakExternal, one.residentSet].map((size) => size.toFixed(1)).join(", ")}; ${one.retained.toFixed(2)} MiB`,
          "",
        ] as const,
    ),
  ];
  const head = `Global fit of 12 runs of 1,000 readings, k and two free orders: medians of ${ratios.rounds} interleaved rounds.\nNode ${node}; ${python3}\n`;
  const waiting = Math.max(0, ...Object.values(ratios.peers ?? {}).map((peer) => peer.waiting));
  if (waiting > MOST_WAITING) {
    rows.push([BUSY, `${(100 * waiting).toFixed(0)} %`, ""]);
    const each = Object.entries(ratios.peers ?? {}).map(
      ([name, peer]) => `${name} ${peer.processorRatio.toFixed(0)}`,
    );
    rows.push(["by the processor time of the peers alone", each.join(", "), ""]);
  }
  const width = Math.max(...rows.map(([title]) => title.length));
  const second = Math.max(...rows.map(([, value]) => value.length));
  const lines = rows.map(([title, value, bound]) =>
    `${title.padEnd(width)}  ${value.padStart(second)}  ${bound}`.trimEnd(),
  );
  return [head, ...lines].join("\n");
}

const OWED: Readonly<Record<string, string>> = {
  numpy: "at least 8",
  lsoda: "at least 50",
  naive: "at least 1000",
};

function peerRow(
  name: string,
  { ratio, milliseconds, agreement }: PeerRatio,
): readonly [string, string, string] {
  const title = Object.entries(PEER_TITLES).find(([key]) => key === name)?.[1] ?? name;
  const apart = `${agreement.inStandardErrors.toExponential(0)} u apart`;
  const value = agreement.agrees ? ratio.toFixed(1) : "not at the same answer";
  return [`${title}, times slower (${milliseconds.toFixed(0)} ms, ${apart})`, value, OWED[name] ?? ""];
}
