import { describe, expect, it } from "vitest";
import { readTable } from "./read-file";
import type { StudyContext } from "./reading";
import { textTable } from "./table-text";
import { EMPTY_STUDY } from "./testing-context";
import { blocking, issue, read, repaired, TWO_RUNS, traces } from "./testing-corpus";

/** Files of corpus/: what must be read from them. What must be said of them is in read-faults.test.ts. */

describe("one table in every dress", () => {
  it.each([
    ["comma-point.csv", ",", ".", "utf-8"],
    ["semicolon-comma.csv", ";", ",", "utf-8"],
    ["tab-comma.tsv", "\t", ",", "utf-8"],
    ["pipe-point.txt", "|", ".", "utf-8"],
    ["comma-quoted-decimal-comma.csv", ",", ",", "utf-8"],
    ["paste-from-spreadsheet.txt", "\t", ".", "utf-8"],
    ["utf8-bom.csv", ";", ",", "utf-8"],
    ["utf16le-bom.csv", ";", ",", "utf-16le"],
    ["utf16be-bom.csv", ";", ",", "utf-16be"],
    ["utf16le-no-bom.csv", ";", ",", "utf-16le"],
    ["old-mac-line-ends.csv", ",", ".", "utf-8"],
    ["blanks-point.txt", " ", ".", "utf-8"],
    ["blanks-comma.txt", " ", ",", "utf-8"],
  ])("%s gives the same traces", (file, separator, decimalMark, encoding) => {
    const reading = read(file);
    expect(reading.separator.value).toBe(separator);
    expect(reading.decimalMark.value).toBe(decimalMark);
    expect(reading.encoding.value).toBe(encoding);
    expect(traces(reading)).toEqual(TWO_RUNS);
    expect(blocking(reading)).toEqual([]);
  });

  it("reads Windows-1252 and keeps the mean of a temperature column with each run", () => {
    const reading = read("windows-1252.csv");
    expect(reading.encoding.value).toBe("windows-1252");
    expect(issue(reading, "preamble").message).toContain("Küvette");
    expect(traces(reading)).toEqual(TWO_RUNS);
    expect(reading.traces.map((trace) => trace.temperatureKelvin)).toEqual([298.15, 298.15]);
  });
});

describe("what stands around the data", () => {
  it("stops where a cell is missing between blanks, since nothing shows which", () => {
    const short = issue(read("blanks-cell-missing.txt"), "short-line");
    expect(short).toMatchObject({ severity: "blocks", line: 3 });
    expect(blocking(repaired("blanks-cell-missing.txt", "short-line", "Leave line 3 out"))).toEqual([]);
    expect(blocking(read("ragged-blanks.txt"))).not.toEqual([]);
  });

  it("passes over statistics below the columns", () => {
    const reading = read("summary-rows.csv");
    expect(traces(reading)).toEqual(TWO_RUNS);
    expect(issue(reading, "summary-row")).toMatchObject({ severity: "note", place: "lines 7 and 8" });
    expect(blocking(reading)).toEqual([]);
  });

  it("finds preamble, names, units and a blank tail", () => {
    const reading = read("preamble-units-tail.csv");
    expect(reading.headerLine.value).toBe(6);
    expect(reading.unitLine.value).toBe(7);
    expect(reading.dataLines.value).toEqual({ from: 8, to: 11 });
    expect(reading.traces.map((trace) => trace.label)).toEqual(["R14", "R13"]);
    expect(issue(reading, "preamble").place).toBe("lines 1 to 4");
    expect(issue(reading, "tail").place).toBe("lines 12 to 14");
    expect(reading.shownLines.map(({ kind }) => kind)).toEqual([
      "preamble",
      "preamble",
      "preamble",
      "preamble",
      "preamble",
      "header",
      "unit",
      "data",
      "data",
      "data",
      "data",
      "skipped",
      "skipped",
    ]);
  });

  it("takes starting concentrations from the preamble, by symbol and by name", () => {
    const [first, second, third] = read("recipes.csv").traces.map((trace) => trace.recipe);
    expect(first).toMatchObject({ a: { molar: 0.0005 }, b: { molar: 0.02 } });
    expect(second).toMatchObject({ a: { molar: 0.001 }, b: { molar: 0.02 } });
    expect(third).toMatchObject({ a: { molar: 0.002 }, b: { molar: 0.04 } });
  });

  it("says which unit it assumed where the preamble gives none", () => {
    const reading = read("recipe-without-unit.csv");
    expect(reading.traces.map((trace) => trace.recipe.b?.molar)).toEqual([0.02, 0.02]);
    expect(issue(reading, "recipe").severity).toBe("note");
    expect(issue(reading, "recipe").message).toContain("taken as mmol L⁻¹");
  });

  it("converts minutes and milliabsorbance named in the line of names", () => {
    const reading = read("minutes-and-milliabsorbance.csv");
    expect(reading.timeUnit.value).toBe("min");
    expect(reading.signalUnit.value).toBe("thousandths");
    expect(traces(reading)).toEqual({
      R1: [
        [0, 30, 60, 90],
        [0.01, 0.015, 0.019, 0.024],
      ],
      R2: [
        [0, 30, 60, 90],
        [0.02, 0.031, 0.04, 0.048],
      ],
    });
  });

  it("reads a table without names and says that it assumed the study's unit of time", () => {
    const reading = read("no-header.csv");
    expect(reading.headerLine.value).toBeNull();
    expect(reading.timeUnit.basis).toBe("assumed");
    expect(Object.keys(traces(reading))).toEqual(["R1", "R2"]);
  });

  it("skips trailing separators and the lines that hold nothing else", () => {
    const reading = read("trailing-separators.csv");
    expect(reading.traces).toHaveLength(2);
    expect(issue(reading, "tail").place).toBe("lines 6 to 7");
  });

  it("keeps traces of different length whole", () => {
    const reading = read("different-lengths.csv");
    expect(reading.traces.map((trace) => trace.signal.length)).toEqual([5, 3]);
    expect(issue(reading, "short-line").severity).toBe("weakens");
  });

  it("leaves a counter and a clock out and says so", () => {
    const reading = read("counter-and-clock.csv");
    expect(reading.columns.map((column) => column.role)).toEqual(["left-out", "left-out", "time", "signal"]);
  });

  it("reads scientific notation and the true minus to the double of the literal", () => {
    expect(traces(read("scientific-and-true-minus.csv"))).toEqual({
      R1: [
        [-1, 0, 1, 2],
        [-1.5e-3, 1e-3, 2e-3, 3e-3],
      ],
      R2: [
        [-1, 0, 1, 2],
        [2.5e-3, 3.5e-3, 4.5e-3, 5.5e-3],
      ],
    });
  });

  it("reads thousands grouped by the mark that is not the decimal mark", () => {
    expect([...(read("grouped-thousands.csv").traces[0]?.signal ?? [])]).toEqual([
      1234.5, 1250.25, 1300.75, 12345.5,
    ]);
  });

  it("shows markup and formulas in names as plain text", () => {
    expect(read("formula-like.csv").traces.map((trace) => trace.label)).toEqual([
      '=HYPERLINK("http://example.org")',
      "<b>R2</b>",
    ]);
  });
});

describe("other layouts", () => {
  it("reads a long table with its runs and their concentrations", () => {
    const reading = read("long.csv");
    expect(reading.layout.value).toBe("long");
    expect(traces(reading)).toEqual({
      R1: [
        [0, 1, 2],
        [0.01, 0.015, 0.019],
      ],
      R2: [
        [0, 1, 2],
        [0.02, 0.031, 0.04],
      ],
    });
    expect(reading.traces.map((trace) => trace.recipe.a?.molar)).toEqual([0.0005, 0.001]);
  });

  it("reads a time column for each signal, named by the line above", () => {
    const reading = read("paired.csv");
    expect(reading.layout.value).toBe("paired");
    expect(traces(reading)).toEqual({
      R1: [
        [0, 1, 2, 3],
        [0.01, 0.015, 0.019, 0.022],
      ],
      R2: [
        [0.5, 1.5, 2.5],
        [0.02, 0.031, 0.04],
      ],
    });
  });
});

describe("questions that are asked and not guessed", () => {
  it("asks whether a mark before three digits is decimal, and reads either answer", () => {
    expect(blocking(read("either-mark.csv"))).toEqual(["decimal-mark"]);
    expect(repaired("either-mark.csv", "decimal-mark", "Read as 1.000").traces[0]?.signal[0]).toBe(1.234);
    expect(repaired("either-mark.csv", "decimal-mark", "Read as 1000").traces[0]?.signal[0]).toBe(1234);
  });

  it("asks when a file has decimal points and decimal commas", () => {
    expect(issue(read("both-marks.csv"), "decimal-mark").message).toContain("“0,010” on line 2");
    const both = repaired("both-marks.csv", "decimal-mark", "Read both as decimal marks");
    expect(blocking(both)).toEqual([]);
    expect(traces(both)).toEqual({
      R1: [
        [0.5, 1.5, 2.5, 3.5],
        [0.01, 0.015, 0.019, 0.022],
      ],
    });
  });

  it("refuses to tell cells apart where the comma is separator and decimal mark", () => {
    const asked = issue(read("comma-for-everything.csv"), "decimal-mark");
    expect(asked).toMatchObject({ severity: "blocks", line: 2 });
    expect(asked.message).toMatch(/“0,5,0,010”.*Export again with semicolons or tabs/);
  });

  it("offers the digit that a letter stands for, or leaving the cell out", () => {
    const slip = issue(read("typing-slip.csv"), "unreadable-cell");
    expect(slip).toMatchObject({ line: 3, column: 2, place: "line 3, R15" });
    expect(slip.message).toContain("“0,2l4”");
    expect([
      ...(repaired("typing-slip.csv", "unreadable-cell", "Read as 0.214").traces[1]?.signal ?? []),
    ]).toEqual([0.213, 0.214, 0.216, 0.219]);
    const left = repaired("typing-slip.csv", "unreadable-cell", "Leave the cell out");
    expect(left.traces.map((trace) => trace.signal.length)).toEqual([4, 3]);
    expect(issue(left, "cell-corrected").repairs[0]?.label).toBe("Undo");
  });
});

describe("runs of the study", () => {
  it("keeps a label as the file writes it", () => {
    const bytes = new TextEncoder().encode(
      "t / s,R01,A_2,K01,ch 4\n0,1.5,2.5,3.5,4.5\n1,1.6,2.6,3.6,4.6\n2,1.7,2.7,3.7,4.7\n",
    );
    const labels = (context: StudyContext) => {
      const reading = readTable(textTable(bytes, {}), context, {});
      return reading.status === "read" && reading.traces.map((trace) => trace.label);
    };
    expect(labels(EMPTY_STUDY)).toEqual(["R01", "R2", "K01", "R4"]);
    // A run with a trace, or none planned under that number, leaves the name as it is.
    expect(labels({ ...EMPTY_STUDY, runs: [{ id: "r9", label: "R09", hasTrace: true, molar: {} }] })).toEqual(
      ["R01", "R2", "K01", "R4"],
    );
  });

  const planned: StudyContext = {
    ...EMPTY_STUDY,
    runs: [
      { id: "r1", label: "R01", hasTrace: false, molar: { a: 0.0001, b: 0.01 } },
      { id: "r2", label: "R02", hasTrace: true, molar: { a: 0.0002, b: 0.02 } },
    ],
  };

  it("matches names by number; a run with a trace keeps it and its recipe is offered to the new run", () => {
    const [first, second] = read("comma-point.csv", {}, planned).traces;
    expect(first).toMatchObject({ label: "R01", runId: "r1", recipe: { a: { molar: 0.0001 } } });
    expect(second).toMatchObject({ label: "R02 (2)", runId: null, recipe: { b: { molar: 0.02 } } });
  });

  it("lets nothing that the file says go over what follows from a planned run's volumes", () => {
    const [one, other] = planned.runs;
    if (one === undefined || other === undefined) throw new Error("two runs");
    const mixed = {
      ...planned,
      runs: [
        { ...one, mixed: ["a"] },
        { ...other, mixed: ["a"] },
      ],
    };
    const [first, second] = read("recipes.csv", { labels: {} }, mixed).traces;
    expect(first?.runId).toBe("r1");
    expect(first?.recipe.a).toEqual({
      molar: 0.0001,
      reason: "follows from the volumes of R01",
      mixed: true,
    });
    expect(first?.recipe.b?.reason).toContain("line");
    // The second becomes a run of its own beside R02, without volumes: the file's word counts.
    expect(second?.recipe.a?.reason).toContain("line");
  });

  it("refuses a label by hand that belongs to a run with a trace", () => {
    const reading = read("comma-point.csv", { labels: { c2: "r02" } }, planned);
    expect(issue(reading, "run-taken-twice").message).toContain("has a trace already");
  });
});
