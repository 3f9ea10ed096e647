import { countedReadings, estimateInitialRate } from "kinetics-core/initial-rate";
import { afterAll, beforeAll, describe, expect, test, vi } from "vitest";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { type TemporaryDatabase, temporaryDatabase } from "@/db/testing/temporary-database";
import { readTrace } from "@/db/trace/read-trace";
import { writeTrace } from "@/db/trace/write-trace";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { rateOptions } from "./run-rate";
import { standingLawView } from "./standing-law.view";
import { traceCounts } from "./trace-counts";

/**
 * Exact pseudo-first-order traces of A + B → P at k = 12 L mol⁻¹ s⁻¹ with a ripple in place of noise: the initial
 * rates are k[A][B] to within what the ripple allows.
 */
const K = 12;
const RECIPES = [
  { A: 50e-6, B: 0.5e-3 },
  { A: 50e-6, B: 1e-3 },
  { A: 50e-6, B: 2e-3 },
  { A: 50e-6, B: 4e-3 },
  { A: 20e-6, B: 2e-3 },
  { A: 100e-6, B: 2e-3 },
] as const;

let temporary: TemporaryDatabase;
let sheet: Sheet;

beforeAll(async () => {
  vi.stubEnv("KINETICS_CORE_HASH", "test");
  temporary = await temporaryDatabase();
  const runs = [];
  for (const [index, recipe] of RECIPES.entries()) {
    const slowness = Math.log(2) / (K * recipe.B);
    const timeSeconds = Float64Array.from({ length: 200 }, (_, i) => (i * 2 * slowness) / 200);
    const signal = timeSeconds.map(
      (time, i) =>
        18_000 * recipe.A * (1 - Math.exp(-K * recipe.B * time)) + 2e-4 * Math.sin(12.9898 * (i + 7 * index)),
    );
    const sha256 = await temporary.db
      .transaction()
      .execute((trx) => writeTrace(trx, { timeSeconds, signal }));
    runs.push(
      exampleRun(index, recipe, {
        trace: { sha256, points: 200, uploadId: null, column: `run ${index + 1}` },
      }),
    );
  }
  sheet = exampleSheet({ runs });
});

afterAll(() => temporary.close());

/** A process that has just started: no memory, the same database. */
async function freshly() {
  vi.resetModules();
  return import("./analyse-study");
}

describe("analysis of a study", () => {
  test("every run's rate of reaction comes from its trace by one rule", async () => {
    const { analyseStudy } = await freshly();
    const analysis = await analyseStudy(temporary.db, sheet);
    expect(analysis.rule).not.toBeNull();
    for (const [index, run] of analysis.runs.entries()) {
      const recipe = RECIPES[index];
      const { rate } = run;
      if (rate.kind !== "estimated" || recipe === undefined) throw new Error("a rate is estimated");
      const error = rate.molarPerSecond - K * recipe.A * recipe.B;
      expect(Math.abs(error)).toBeLessThan(4 * rate.standardError);
      expect(run.state).toBe("standing");
    }
  });

  test("what a run says of its trace decides what is fitted, in the record as in the preview", async () => {
    const { analyseStudy } = await freshly();
    const [first, ...rest] = sheet.runs;
    if (first?.trace == null) throw new Error("the first run has a trace");
    const { timeSeconds, signal } = await readTrace(temporary.db, first.trace.sha256);
    const step = timeSeconds[1] ?? 0;
    // Eight readings that a bubble lifted, two of them inside the part that counts and marked.
    const spoiled = signal.map((value, i) => (i < 6 || i === 20 || i === 40 ? value + 0.2 : value));
    const sha256 = await temporary.db
      .transaction()
      .execute((trx) => writeTrace(trx, { timeSeconds, signal: spoiled }));
    const marked = {
      ...first,
      trace: { ...first.trace, sha256 },
      deadTimeSeconds: 6 * step,
      trim: { fromSeconds: 0, toSeconds: 150 * step },
      spikes: [20, 40],
    };
    const analysis = await analyseStudy(temporary.db, { ...sheet, runs: [marked, ...rest] });
    const rate = analysis.runs[0]?.rate;
    if (rate?.kind !== "estimated") throw new Error("a rate is estimated");
    const truth = K * RECIPES[0].A * RECIPES[0].B;
    expect(Math.abs(rate.molarPerSecond - truth)).toBeLessThan(4 * rate.standardError);
    // The worker in the browser: the stored readings, what counts of them, and the options of the record.
    const preview = estimateInitialRate(
      countedReadings({ time: timeSeconds, signal: spoiled }, traceCounts(marked)),
      rateOptions(sheet, marked, analysis.rule?.rule ?? null),
    );
    expect(preview).toEqual(rate.initialRate);

    const unmarked = { ...marked, spikes: [20] };
    const other = await analyseStudy(temporary.db, { ...sheet, runs: [unmarked, ...rest] });
    expect(other.hash).not.toBe(analysis.hash);
    expect(other.runs[0]?.rate).not.toEqual(rate);
  });

  test("a sheet whose traces give no usable rate says why, and where it is mended", async () => {
    const { analyseStudy } = await freshly();
    const missing = async (changed: Sheet) => {
      const { law } = await analyseStudy(temporary.db, changed);
      return law.status === "no-law" ? law.missing : "";
    };
    // The signal rises with the product; said to follow a reactant, every rate comes out negative.
    expect(await missing({ ...sheet, followedSpeciesId: "A" })).toMatch(
      /^No rate is above zero: the signals rise or stand still, while .+ is used up\. In Set-up, /,
    );
    const unnamed = sheet.runs.map((run) => ({
      ...run,
      concentrations: Object.fromEntries(Object.entries(run.concentrations).filter(([id]) => id !== "B")),
    }));
    expect(await missing({ ...sheet, runs: unnamed })).toContain("starting concentration of every species");
    const bare = sheet.runs.map((run) => ({ ...run, trace: null }));
    expect(await missing({ ...sheet, runs: bare })).toBe(
      "No standing run has a rate: traces or entered rates are needed.",
    );
  });

  test("orders and k come back from the traces, and the strip words them", async () => {
    const { analyseStudy } = await freshly();
    const analysis = await analyseStudy(temporary.db, sheet);
    const { law } = analysis;
    if (law.status !== "law") throw new Error(law.missing);
    expect(law.fit.simpleOrders).toMatchObject({ orders: { A: 1, B: 1 }, reading: { A: "is", B: "is" } });
    const [low, high] = law.fit.simpleOrders.rateConstant.interval ?? [0, 0];
    expect(low).toBeLessThan(K);
    expect(high).toBeGreaterThan(K);
    const view = standingLawView(sheet, analysis, (station) => `/${station}`);
    expect(view.law).toMatchObject({
      status: "law",
      expression: {
        factors: [
          { symbol: "A", order: "1" },
          { symbol: "B", order: "1" },
        ],
      },
      constant: { symbol: "*k*", unit: "L mol^-1 s^-1" },
    });
    expect(view.conditions).toMatch(
      /^95 % confidence interval, 25\.0 °C, water\. A is species A, B is species B\.$/,
    );
  });

  test("once rates are kept, neither a restart nor setting a run aside reads a trace again", async () => {
    const aside = { reason: "bubble", memberId: "m", at: "2026-01-05T10:00:00.000Z" };
    const without = {
      ...sheet,
      runs: sheet.runs.map((run, index) => (index === 2 ? { ...run, setAside: aside } : run)),
    };
    const whole = await (await freshly()).analyseStudy(temporary.db, sheet);
    // Were a trace read now, the analysis would fail on its missing bytes.
    await temporary.db.deleteFrom("blob_part").execute();
    const { analyseStudy } = await freshly();
    expect(await analyseStudy(temporary.db, sheet)).toEqual(whole);
    const less = await analyseStudy(temporary.db, without);
    expect(less.runs[2]).toMatchObject({ state: "set-aside", rate: { kind: "estimated" } });
    expect(less.hash).not.toBe(whole.hash);
  });

  test("what is no input of the analysis does not change its hash", async () => {
    const { analyseStudy } = await freshly();
    const whole = await analyseStudy(temporary.db, sheet);
    const remarked = {
      ...sheet,
      runs: sheet.runs.map((run) => ({ ...run, remark: "cloudy", changedIn: 7 })),
    };
    expect((await analyseStudy(temporary.db, remarked)).hash).toBe(whole.hash);
  });
});
