import { afterAll, beforeAll, describe, expect, test } from "vitest";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { standingLawView } from "@/app/_worksheet/standing-law.view";
import { stationRailView } from "@/app/_worksheet/station-rail.view";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { type TemporaryDatabase, temporaryDatabase } from "@/db/testing/temporary-database";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { rateLawView } from "./rate-law.view";

/** Rates of v = 12 [A][B] with invented scatter of 2 %, entered by hand. */
const RECIPES: readonly (readonly [number, number, number])[] = [
  [50e-6, 0.5e-3, 0.021],
  [50e-6, 1e-3, -0.014],
  [50e-6, 2e-3, 0.006],
  [50e-6, 3e-3, -0.018],
  [50e-6, 4e-3, 0.012],
  [20e-6, 2e-3, -0.009],
  [70e-6, 2e-3, 0.017],
  [100e-6, 2e-3, -0.02],
  [50e-6, 2e-3, 0.004],
];

function sheetOf(
  recipes: readonly (readonly [number, number, number])[],
  change: Partial<Sheet> = {},
  rate = (a: number, b: number) => 12 * a * b,
): Sheet {
  return exampleSheet({
    runs: recipes.map(([A, B, scatter], index) =>
      exampleRun(
        index,
        { A, B },
        { enteredRate: { molarPerSecond: rate(A, B) * Math.exp(scatter), standardError: null } },
      ),
    ),
    ...change,
  });
}

let temporary: TemporaryDatabase;
beforeAll(async () => {
  temporary = await temporaryDatabase();
});
afterAll(() => temporary.close());

async function look(sheet: Sheet) {
  const analysis = await analyseStudy(temporary.db, sheet);
  return {
    law: rateLawView(sheet, analysis),
    strip: standingLawView(sheet, analysis, (station) => `#${station}`),
    rail: stationRailView(sheet, analysis, (station) => `#${station}`),
  };
}

describe("a law that stands", () => {
  test("is a sentence about what the runs support, with the numbers behind it", async () => {
    const { law } = await look(sheetOf(RECIPES));
    expect(law.verdict.claim).toBe("Nine runs support first order in each reactant.");
    expect(law.verdict.support).toMatch(/^No run departs from the law by more than \d\.\d % \(R0\d\)\. /);
    expect(law.orders.map((order) => [order.name, order.reading])).toEqual([
      ["A", "settled: 1"],
      ["B", "settled: 1"],
    ]);
    expect(law.constants.map((row) => [row.name, row.unit, row.standing])).toEqual([
      ["*k*, simple orders", "L mol^-1 s^-1", true],
      ["*k*, free orders", expect.stringMatching(/^\(mol L\^-1\)\^-[01]\.\d+ s\^-1$/), false],
      ["rate at the centre", "mmol L^-1 s^-1", false],
    ]);
  });

  test("prints a constant with a lopsided interval without a half width beside it", async () => {
    const scattered = RECIPES.map(([a, b, scatter]) => [a, b, 10 * scatter] as const);
    const { law } = await look(sheetOf(scattered));
    for (const { name, number, interval } of law.constants) {
      const ends = /^\(?([\d.\u202f\u2212]+) to ([\d.\u202f\u2212]+)/.exec(interval ?? "");
      const [low, high, value] = [ends?.[1], ends?.[2], number.value].map((text) =>
        Number((text ?? "").replaceAll("\u202f", "").replace("\u2212", "-")),
      );
      const arms = ((high ?? 0) - (value ?? 0)) / ((value ?? 0) - (low ?? 0));
      expect([name, number.uncertainty === null]).toEqual([name, arms > 1.5]);
    }
    // Free orders carry k far outside the runs' concentrations, to 1 mol/L; the centre lies among them.
    expect(law.constants.find((row) => row.name === "*k*, free orders")?.number.uncertainty).toBeNull();
    expect(law.constants.find((row) => row.name === "rate at the centre")?.number.uncertainty).not.toBeNull();
  });

  test("has a budget whose lines make the interval in squares", async () => {
    const { law } = await look(sheetOf(RECIPES));
    const rows = law.budget?.rows ?? [];
    expect(rows.length).toBeGreaterThan(1);
    const together = Math.sqrt(rows.reduce((sum, row) => sum + Number(row.half) ** 2, 0));
    const last = 0.5 * 10 ** -(law.budget?.total.split(".")[1]?.length ?? 0);
    // Every line is rounded to the last place of the total.
    expect(Math.abs(together - Number(law.budget?.total))).toBeLessThan(last * (1 + rows.length));
    expect(rows.reduce((sum, row) => sum + Number(row.share), 0)).toBeGreaterThan(97);
    expect(law.budget?.note).toContain("80 kJ mol^-1");
  });

  test("draws the species varied first first, and brackets the runs that hold it", async () => {
    const { law } = await look(sheetOf(RECIPES));
    expect(law.figures.map((one) => one.speciesId)).toEqual(["B", "A"]);
    const [first] = law.figures;
    expect(first?.figure.points.filter((point) => point.held).map((point) => point.label)).toEqual([
      "R03",
      "R06",
      "R07",
      "R08",
      "R09",
    ]);
    expect(first?.figure.guides.map((guide) => guide.label)).toEqual(["order ½", "order 2"]);
    for (const point of first?.figure.points ?? []) {
      const near = first?.figure.band.reduce((best, at) =>
        Math.abs(at.x - point.x) < Math.abs(best.x - point.x) ? at : best,
      );
      expect(near?.low).toBeLessThan(near?.high ?? 0);
    }
  });

  test("lists every run's influence, the greatest first, and each pair that differs in one species", async () => {
    const { law } = await look(sheetOf(RECIPES));
    const shifts = (law.influence?.rows ?? []).map((row) =>
      Math.abs(Number(row.shift.replace(/[\u2212+ %]/g, ""))),
    );
    expect(shifts).toHaveLength(9);
    expect(shifts).toEqual([...shifts].sort((a, b) => b - a));
    expect(law.pairs.every((pair) => pair.species === "A" || pair.species === "B")).toBe(true);
    expect(law.pairs.length).toBeGreaterThan(10);
  });

  test("stands in the strip with its interval, and in miniature on the rail", async () => {
    const { strip, rail } = await look(sheetOf(RECIPES));
    expect(strip.law).toMatchObject({
      status: "law",
      expression: { constant: "*k*" },
      constant: { symbol: "*k*", unit: "L mol^-1 s^-1" },
    });
    expect(strip.announcement).toMatch(
      /^Standing law: rate = k \[A\] to the 1 \[B\] to the 1, k = 1[12]\.\d ± 0\.\d/,
    );
    expect(strip.facts.map((fact) => [fact.label, fact.headline])).toEqual([
      ["Evidence", "9 runs"],
      ["Nearest rival", "Not compared"],
      ["Weakest link", "Order in A"],
      ["Checks", "None weakens"],
    ]);
    expect(rail.map((station) => [station.name, station.state])).toEqual([
      ["Set-up", "holds"],
      ["Standards", "open"],
      ["Runs", "holds"],
      ["Rates", "holds"],
      ["Rate law", "holds"],
    ]);
    expect(rail.at(-1)?.yield).toMatch(/^\[A\]\^\{1\} \[B\]\^\{1\}, ±\d\.\d %$/);
  });
});

describe("an order that is not settled", () => {
  test("stays free in the law, and the rate at the centre stands in place of k", async () => {
    const { law, strip } = await look(sheetOf(RECIPES, {}, (a, b) => 0.4 * a * b ** 0.72));
    expect(law.verdict.claim).toMatch(/^Nine runs support first order in A and an order of 0\.7\d in B\.$/);
    expect(strip.law).toMatchObject({
      expression: { factors: [{ order: "1" }, { order: expect.stringMatching(/^0\.7\d$/) }] },
      constant: { symbol: "*v*_c", unit: "mmol L^-1 s^-1" },
    });
    expect(strip.conditions).toContain("*v*_c is the rate at the centre of the runs, [A] = ");
    expect(law.budget?.of).toBe("the rate at the centre");
  });

  test("is called unsettled where the runs say too little", async () => {
    const scattered = RECIPES.slice(0, 6).map(([a, b, scatter]) => [a, b, scatter * 25] as const);
    const { law } = await look(sheetOf(scattered));
    expect(law.verdict.claim).toBe("Six runs leave the orders in A and B unsettled.");
  });

  test("may be held by hand, and the law then says so", async () => {
    const { law, strip } = await look(sheetOf(RECIPES, { orders: { A: 1, B: 1 } }));
    expect(law.verdict.claim).toBe(
      "Nine runs fix *k* with the order in A held at 1 and the order in B held at 1.",
    );
    expect(law.orders.map((order) => order.reading)).toEqual(["held by hand", "held by hand"]);
    expect(strip.law).toMatchObject({ constant: { symbol: "*k*", unit: "L mol^-1 s^-1" } });
    expect(law.constants.map((row) => row.name)).toEqual(["*k*, simple orders", "rate at the centre"]);
  });
});

describe("no law", () => {
  test("without runs says that runs are needed", async () => {
    const { law, strip, rail } = await look(exampleSheet());
    expect(law.verdict.claim).toBe("The runs do not support a law yet.");
    expect(strip.law).toEqual({
      status: "no-law",
      missing: "The run sheet is empty: runs at two or more levels of each species are needed.",
    });
    expect(rail.map((station) => station.state)).toEqual(["holds", "open", "open", "open", "open"]);
  });

  test("with one level of a species says how many more are needed, and keeps what is known", async () => {
    const alone = RECIPES.filter(([, b]) => b === 2e-3);
    const { law, strip } = await look(sheetOf(alone));
    expect(strip.law).toEqual({
      status: "no-law",
      missing: "Two more levels of B are needed, or its order held.",
    });
    expect(law.orders.find((order) => order.name === "A")?.text).toMatch(/^\d\.\d+ ± 0\.\d+$/);
    expect(law.orders.find((order) => order.name === "B")?.text).toBe("undetermined");
    expect(law.constants).toEqual([]);
  });

  test("where two species were varied together says what is known all the same", async () => {
    const together = [0.5, 1, 2, 4].map((factor) => [50e-6 * factor, 2e-3 * factor, 0.01 * factor] as const);
    const { law, strip } = await look(sheetOf(together));
    expect(strip.law.status).toBe("no-law");
    expect(law.undetermined.join(" ")).toContain("A and B were varied together");
  });

  test("with as many runs as unknowns a law stands without interval, and a check says why", async () => {
    const exact = [RECIPES[0], RECIPES[2], RECIPES[5]].flatMap((recipe) =>
      recipe === undefined ? [] : [recipe],
    );
    const { law, strip } = await look(sheetOf(exact));
    expect(strip.law.status).toBe("law");
    expect(strip.conditions).toContain("No interval can be given");
    expect(law.verdict.support).toContain("nothing is left to judge them by");
    expect(law.budget).toBeNull();
    expect(law.checks.some((check) => check.severity === "blocks")).toBe(true);
  });
});
