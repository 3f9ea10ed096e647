import Papa from "papaparse";
import { afterAll, beforeAll, describe, expect, it } from "vitest";
import { type TemporaryDatabase, temporaryDatabase } from "@/db/testing/temporary-database";
import { writeTrace } from "@/db/trace/write-trace";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { analyseStudy } from "../analyse-study";
import { commaSeparated, runsAndRatesTable } from "./runs-and-rates";
import { tracesTable } from "./traces-table";

const TIME = [0, 0.1, 0.30000000000000004, 1e-9 + 1];
const SIGNAL = [0, -0.00042, 1 / 3, 6.02214076e23];

let temporary: TemporaryDatabase;
let sha256: string;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  sha256 = await temporary.db
    .transaction()
    .execute((trx) =>
      writeTrace(trx, { timeSeconds: Float64Array.from(TIME), signal: Float64Array.from(SIGNAL) }),
    );
});

afterAll(() => temporary.close());

const cells = (table: string) => Papa.parse<string[]>(table, { skipEmptyLines: false }).data;

describe("the table of traces", () => {
  it("gives back every reading as the same double, a line each and no line more", async () => {
    const trace = { sha256, points: 4, uploadId: null, column: "c" };
    const sheet = exampleSheet({
      runs: [
        exampleRun(0, { A: 1e-3, B: 1e-3 }, { trace }),
        exampleRun(1, { A: 1e-3, B: 2e-3 }),
        exampleRun(2, { A: 1e-3, B: 1e-3 }, { trace, removedIn: 3 }),
      ],
    });
    let table = "";
    for await (const part of tracesTable(temporary.db, sheet)) table += part;
    const [heads, ...rows] = cells(table);
    expect(heads).toEqual(["run", "time / s", "absorbance"]);
    expect(rows.pop()).toEqual([""]);
    expect(rows.map(([run, time, signal]) => [run, Number(time), Number(signal)])).toEqual(
      TIME.map((time, index) => ["R01", time, SIGNAL[index]]),
    );
  });
});

describe("the table of a long trace", () => {
  it("comes in parts of some thousand readings and misses none between them", async () => {
    const timeSeconds = Float64Array.from({ length: 12_001 }, (_, i) => i / 10);
    const long = await temporary.db
      .transaction()
      .execute((trx) => writeTrace(trx, { timeSeconds, signal: timeSeconds }));
    const trace = { sha256: long, points: timeSeconds.length, uploadId: null, column: "c" };
    const sheet = exampleSheet({ runs: [exampleRun(0, { A: 1e-3, B: 1e-3 }, { trace })] });
    const times: number[] = [];
    for await (const part of tracesTable(temporary.db, sheet)) {
      const rows = cells(part.trimEnd());
      expect(rows.length).toBeLessThanOrEqual(5000);
      times.push(...rows.map(([, time]) => Number(time)));
    }
    expect(times.slice(1)).toEqual([...timeSeconds]);
  });
});

describe("the table of runs and rates", () => {
  it("says units in its heads, the reason of a run set aside, and nothing where nothing is known", async () => {
    const entered = (molarPerSecond: number) => ({ molarPerSecond, standardError: null });
    const sheet = exampleSheet({
      runs: [
        exampleRun(0, { A: 1e-3, B: 2e-3 }, { enteredRate: entered(4e-6), temperatureKelvin: 298.65 }),
        exampleRun(
          1,
          { A: 1e-3, B: 4e-3 },
          {
            enteredRate: entered(8e-6),
            setAside: { reason: "bubble at 6 s", memberId: "m", at: "2026-12-01T00:00:00.000Z" },
          },
        ),
        exampleRun(2, { A: 2e-3 }),
      ],
    });
    const table = cells(runsAndRatesTable(sheet, await analyseStudy(temporary.db, sheet)));
    const [heads = [], first, second, third] = table;
    const cell = (row: string[] | undefined, head: string) => row?.[heads.indexOf(head)];
    expect(cell(first, "[A]0 / mmol L^-1")).toBe("1");
    expect(cell(first, "u([A]0) / mmol L^-1")).toBe("0.01");
    expect(cell(first, "rate / mmol L^-1 s^-1")).toBe("0.004");
    expect(cell(first, "u(rate) / mmol L^-1 s^-1")).toBe("");
    expect([cell(first, "temperature / degC"), cell(first, "temperature of")]).toEqual(["25.5", "run"]);
    expect([cell(second, "temperature / degC"), cell(second, "temperature of")]).toEqual(["25", "study"]);
    expect(cell(second, "state")).toBe("set-aside");
    expect(cell(second, "reason")).toBe("bubble at 6 s");
    expect(cell(third, "[B]0 / mmol L^-1")).toBe("");
    expect(cell(third, "rate / mmol L^-1 s^-1")).toBe("");
  });

  it("lets no label run as a formula in a spreadsheet, and leaves negative numbers alone", () => {
    expect(commaSeparated([["=1+1", "@x", -0.5, null]])).toBe(`"'=1+1","'@x",-0.5,\n`);
    expect(commaSeparated([["=1+1\nover two lines", "\n=1+1", " =1+1", "\uff1d1+1"]])).toBe(
      `"'=1+1\nover two lines","'\n=1+1","' =1+1","'\uff1d1+1"\n`,
    );
  });
});
