import { describe, expect, it } from "vitest";
import { type Answer, agreementOf } from "./agreement";
import type { PeerRatio } from "./measure-ratios";
import { type Benchmark, failuresOf, jsonOf, tableOf } from "./report";

const ours: Answer = { estimates: [-0.2, 1, 1], standardErrors: [0.04, 0.006, 0.006], betweenRuns: 0.03 };

function peer(answer: Answer): PeerRatio {
  return {
    ratio: 12,
    milliseconds: 20,
    fits: 15,
    processorRatio: 12,
    waiting: 0,
    agreement: agreementOf(ours, answer),
  };
}

function benchmarkWith(numpy: Answer): Benchmark {
  const peers = { numpy: peer(numpy), lsoda: peer(ours), odeint: peer(ours), naive: peer(ours) };
  return {
    ratios: { rounds: 15, milliseconds: 1.4, floor: 1.9, floorMilliseconds: 0.7, peers },
    expression: { text: "k [A]", ratio: 1.3 },
    growth: { runs: 0.8, points: 0.4 },
    bootstrap: { refits: 1000, failed: 0, seconds: 1, ratio: 0.5, stoppedAfter: 10 },
    memory: [],
    versions: { node: "v20", python: "3", numpy: "2", scipy: "1" },
    absent: null,
  };
}

describe("a peer", () => {
  it("counts where it is at the same answer", () => {
    const benchmark = benchmarkWith({ ...ours, estimates: [-0.2004, 1, 1] });
    expect(failuresOf(benchmark)).toEqual([]);
    expect(jsonOf(benchmark).ratio).toEqual({ numpy: 12, lsoda: 12, naive: 12, floor: 1.9 });
  });

  it.each([
    ["an order", { ...ours, estimates: [-0.2, 1.001, 1] }],
    ["a standard error", { ...ours, standardErrors: [0.04, 0.006, 0.0055] }],
    ["the scatter between runs", { ...ours, betweenRuns: 0.04 }],
    ["a number", { ...ours, estimates: [Number.NaN, 1, 1] }],
  ])("with another %s fails the benchmark and is not counted", (_, answer) => {
    const benchmark = benchmarkWith(answer);
    expect(failuresOf(benchmark)).toHaveLength(1);
    expect(failuresOf(benchmark)[0]).toMatch(/^numpy is not at the same answer/);
    expect(jsonOf(benchmark).ratio.numpy).toBeNull();
    expect(tableOf(benchmark)).toMatch(/same_model_numpy\.py.*not at the same answer/);
  });
});

it("without Python has no ratio to it, and says why", () => {
  const { ratios, ...rest } = benchmarkWith(ours);
  const benchmark = { ...rest, ratios: { ...ratios, peers: null }, absent: "python3 is not here" };
  expect(jsonOf(benchmark).ratio).toEqual({ numpy: null, lsoda: null, naive: null, floor: 1.9 });
  expect(jsonOf(benchmark).absent).toBe("python3 is not here");
  expect(failuresOf(benchmark)).toEqual([]);
});
