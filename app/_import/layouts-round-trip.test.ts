import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { readFile } from "./read-file";
import { EMPTY_STUDY } from "./testing-context";
import { testRows, testWorkbook } from "./workbook/testing-workbook";

/**
 * Random runs written in every layout, in every locale and as a workbook, must come back to the last bit under the
 * names they went out with. Seeded: a failure names a table that can be made again.
 */
interface Run {
  readonly name: string;
  readonly time: readonly number[];
  readonly signal: readonly number[];
}

type Cell = string | number;
type Table = readonly (readonly Cell[])[];

function randomRuns(seed: number, sharedTimes: boolean): Run[] {
  const draws = randomDraws(seed);
  const times = () => {
    let at = 0;
    return Array.from({ length: 6 + draws.whole(20) }, () => {
      at += 0.25 + draws.uniform();
      return Number(at.toPrecision(6));
    });
  };
  const shared = times();
  return Array.from({ length: 2 + draws.whole(4) }, (_, i) => {
    const time = sharedTimes ? shared : times();
    return {
      name: `R${i + 1}`,
      time,
      signal: time.map(() => Number(((draws.uniform() - 0.2) * 10 ** (draws.whole(5) - 3)).toPrecision(7))),
    };
  });
}

const LAYOUTS: Readonly<Record<string, { shared: boolean; write: (runs: readonly Run[]) => Table }>> = {
  wide: {
    shared: true,
    write: (runs) => [
      ["t / s", ...runs.map(({ name }) => name)],
      ...(runs[0]?.time ?? []).map((t, i) => [t, ...runs.map(({ signal }) => signal[i] ?? "")]),
    ],
  },
  paired: {
    shared: false,
    write: (runs) => {
      const rows = Math.max(...runs.map(({ time }) => time.length));
      return [
        runs.flatMap(({ name }) => ["t / s", name]),
        ...Array.from({ length: rows }, (_, i) =>
          runs.flatMap(({ time, signal }) => [time[i] ?? "", signal[i] ?? ""]),
        ),
      ];
    },
  },
  long: {
    shared: false,
    write: (runs) => [
      ["run", "t / s", "A"],
      ...runs.flatMap(({ name, time, signal }) => time.map((t, i) => [name, t, signal[i] ?? ""])),
    ],
  },
  blocks: {
    shared: false,
    write: (runs) =>
      runs.flatMap(({ name, time, signal }) => [
        [name],
        ["t / s", "A"],
        ...time.map((t, i) => [t, signal[i] ?? ""]),
        [""],
      ]),
  },
  turned: {
    shared: true,
    write: (runs) => [
      ["t / s", ...(runs[0]?.time ?? [])],
      ...runs.map(({ name, signal }) => [name, ...signal]),
    ],
  },
};

const LOCALES = [
  { separator: ",", mark: "." },
  { separator: ";", mark: "," },
  { separator: ";", mark: "." },
  { separator: "\t", mark: "," },
  { separator: "|", mark: "." },
];

async function expectRuns(bytes: Uint8Array, runs: readonly Run[], what: string) {
  const reading = await readFile(bytes, EMPTY_STUDY, {});
  if (reading.status !== "read") throw new Error(`${what}: ${reading.message}`);
  expect(
    reading.issues.filter(({ severity }) => severity === "blocks"),
    what,
  ).toEqual([]);
  expect(
    reading.traces.map(({ label, timeSeconds, signal }) => ({
      name: label,
      time: [...timeSeconds],
      signal: [...signal],
    })),
    what,
  ).toEqual(runs);
}

describe.each(Object.entries(LAYOUTS))("runs in a %s table", (layout, { shared, write }) => {
  it.each(LOCALES)("divided by $separator with $mark as decimal mark", async ({ separator, mark }) => {
    for (let seed = 1; seed <= 15; seed++) {
      const runs = randomRuns(seed, shared);
      const text = write(runs)
        .map((row) =>
          row
            .map((cell) => (typeof cell === "number" ? String(cell).replace(".", mark) : cell))
            .join(separator),
        )
        .join(seed % 2 === 0 ? "\n" : "\r\n");
      await expectRuns(new TextEncoder().encode(text), runs, `${layout}, seed ${seed}`);
    }
  });

  it("as a workbook", async () => {
    for (let seed = 21; seed <= 26; seed++) {
      const runs = randomRuns(seed, shared);
      const rows = testRows(write(runs).map((row) => row.map((cell) => (cell === "" ? null : cell))));
      await expectRuns(testWorkbook([{ name: "Runs", rows }]), runs, `${layout}, seed ${seed}`);
    }
  });
});
