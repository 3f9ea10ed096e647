import type { Estimate } from "kinetics-core/quantities";
import { type RandomDraws, randomDraws } from "kinetics-core/random";
import { fitRateLaw, type RateLawInput } from "kinetics-core/rate-law";
import { describe, expect, it } from "vitest";
import {
  forRateLaw,
  type MeasuredVolume,
  type MixedSolution,
  type MixingInput,
  mixRuns,
  type Stock,
  type Total,
} from "./index";

/**
 * From the bench to ln k with known truth: stocks known to 3 %, B by a dilution chain of 2 % a step, a pipette with a
 * calibration error of 1 %, deliveries that repeat to 0.5 %. What was really in the vessel differs from what the sheet
 * says by draws of exactly these errors. Limits as for the other coverage tests: with the shared errors never below the
 * 0.5 % point of a binomial with 92.5 %; without them far below, or the test would show nothing.
 */
const REPLICATES = 150;
/** Computed with SciPy 1.17: binom.ppf(0.005, 150, 0.925). */
const FEWEST = 130;

const ORDERS = { A: 1, B: 1 };
const RATE_CONSTANT = 0.3;
const SCATTER = 0.01;

function diluted(name: string, from: string): MixedSolution {
  return {
    kind: "mixture",
    name,
    portions: [{ solution: from, volume: 10, standardUncertainty: 0.14 }],
    total: { kind: "mark", volume: 20, standardUncertainty: 0.28 },
  };
}

const recipes = [
  { a: 1, b: "B" },
  { a: 2, b: "B" },
  { a: 4, b: "B" },
  { a: 2, b: "B/2" },
  { a: 4, b: "B/2" },
  { a: 2, b: "B/4" },
  { a: 2, b: "B/8" },
  { a: 1, b: "B/8" },
] as const;

const sheet: MixingInput = {
  devices: [{ name: "pipette", relative: 0.01 }],
  solutions: [
    stockOf("A", 0.2, 0.03),
    stockOf("B", 0.8, 0.03),
    diluted("B/2", "B"),
    diluted("B/4", "B/2"),
    diluted("B/8", "B/4"),
  ],
  runs: recipes.map(({ a, b }, j) => ({
    label: `R0${j + 1}`,
    portions: [
      { solution: "A", volume: a, standardUncertainty: 0.005 * a, device: "pipette" },
      { solution: b, volume: 2, standardUncertainty: 0.01 },
    ],
    total: { kind: "mark", volume: 10 },
  })),
};

function stockOf(name: string, molar: number, relative: number): Stock {
  return {
    kind: "stock",
    name,
    solutes: [
      {
        name,
        concentration: { value: molar, standardUncertainty: relative * molar },
        species: { [name]: 1 },
      },
    ],
  };
}

/** The sheet as it really was: every stated error drawn once. */
function truthOf({ solutions, runs, devices = [] }: MixingInput, draws: RandomDraws): MixingInput {
  const calibration = new Map(devices.map(({ name, relative }) => [name, relative * draws.normal()]));
  const delivered = <T extends MeasuredVolume>(one: T): T => ({
    ...one,
    volume:
      one.volume * (1 + (calibration.get(one.device ?? "") ?? 0)) +
      (one.standardUncertainty ?? 0) * draws.normal(),
  });
  const madeUp = (total: Total | null): Total | null => (total?.kind === "mark" ? delivered(total) : total);
  return {
    devices,
    solutions: solutions.map((one) =>
      one.kind === "mixture"
        ? { ...one, portions: one.portions.map(delivered), total: madeUp(one.total) }
        : {
            ...one,
            solutes: one.solutes.map((solute) => {
              const { value, standardUncertainty } = solute.concentration;
              return {
                ...solute,
                concentration: { value: value + standardUncertainty * draws.normal(), standardUncertainty },
              };
            }),
          },
    ),
    runs: runs.map((run) => ({ ...run, portions: run.portions.map(delivered), total: madeUp(run.total) })),
  };
}

interface Covered {
  lnK: number;
  orderOfB: number;
}

/** The same runs with their shared errors and without them. */
function coverage(seed: number): { readonly counted: Covered; readonly ignored: Covered } {
  const draws = randomDraws(seed);
  const { runs, shared } = forRateLaw(mixRuns(sheet), ["A", "B"]);
  const counted: Covered = { lnK: 0, orderOfB: 0 };
  const ignored: Covered = { lnK: 0, orderOfB: 0 };
  for (let replicate = 0; replicate < REPLICATES; replicate++) {
    const vessel = forRateLaw(mixRuns(truthOf(sheet, draws)), ["A", "B"]).runs;
    const input: RateLawInput = {
      species: ["A", "B"],
      runs: runs.map((run, j) => {
        const { A = 0, B = 0 } = vessel[j]?.concentrations ?? {};
        const rate = RATE_CONSTANT * A ** ORDERS.A * B ** ORDERS.B * Math.exp(SCATTER * draws.normal());
        return { ...run, rate };
      }),
    };
    count(counted, { ...input, shared });
    count(ignored, input);
  }
  return { counted, ignored };
}

function count(covered: Covered, input: RateLawInput): void {
  const law = fitRateLaw(input);
  if (law.status !== "fitted") throw new Error(law.message);
  if (holds(law.logRateConstant, Math.log(RATE_CONSTANT))) covered.lnK += 1;
  if (holds(law.orders.B, ORDERS.B)) covered.orderOfB += 1;
}

function holds(estimate: Estimate | undefined, truth: number): boolean {
  const interval = estimate?.interval ?? null;
  return interval !== null && interval[0] <= truth && truth <= interval[1];
}

describe("stocks, a dilution chain and a pipette, from the sheet to ln k", () => {
  it("are the shared errors of the law, each by its name", () => {
    const { shared } = forRateLaw(mixRuns(sheet), ["A", "B"]);
    expect(shared.map((one) => [one.source, one.runs?.length ?? "all"])).toEqual([
      ["Stock A", "all"],
      ["Stock B", "all"],
      ["Dilution B/2", 5],
      ["Dilution B/4", 3],
      ["Dilution B/8", 2],
      ["Calibration of pipette", "all"],
    ]);
    // Aliquot 1.4 % and flask 1.4 %.
    expect(shared[3]?.relative).toBeCloseTo(0.0198, 4);
  });

  it("keep the intervals of ln k and of the order in B at their level; ignored, they lose it", () => {
    const { counted, ignored } = coverage(31_001);
    expect(counted.lnK).toBeGreaterThanOrEqual(FEWEST);
    expect(counted.orderOfB).toBeGreaterThanOrEqual(FEWEST);
    expect(ignored.lnK).toBeLessThan(0.85 * REPLICATES);
    expect(ignored.orderOfB).toBeLessThan(0.75 * REPLICATES);
  });
});
