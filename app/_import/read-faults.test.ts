import { describe, expect, it } from "vitest";
import { readTable } from "./read-file";
import type { StudyContext } from "./reading";
import { textTable } from "./table-text";
import { EMPTY_STUDY } from "./testing-context";
import { blocking, issue, read, refusal, repaired, traces } from "./testing-corpus";

/** Files of corpus/ that are refused or read with questions: what must be said. */

describe("what cannot be a table", () => {
  it.each([
    ["empty.csv", /empty: it holds 0 bytes/],
    ["blank-lines.csv", /nothing but blank lines/],
    ["old-workbook.xls", /old format \(XLS\).*Save it as XLSX/],
    ["noise.bin", /binary file.*save it as XLSX or CSV/],
    ["picture.png", /picture/],
    ["spectrum.jdx", /JCAMP-DX.*an axis without a unit, not along time/],
    ["only-text.csv", /No line of numbers.*“name colour”/],
  ])("%s is refused with the way out", (file, message) => {
    expect(refusal(file)).toMatch(message);
  });
});

describe("what is wrong within a table", () => {
  it("leaves a column of text out, and blocks when it is wanted as a signal", () => {
    const reading = read("column-of-text.csv");
    expect(issue(reading, "column-left-out").message).toContain(
      "“remark” is left out: text, no numbers: “dry”",
    );
    expect(blocking(reading)).toEqual([]);
    const wanted = read("column-of-text.csv", { columns: { "2": "signal" } });
    expect(blocking(wanted).length).toBeGreaterThan(0);
  });

  it("names the lines of a repeated time and takes the first or the mean", () => {
    const repeated = issue(read("repeated-times.csv"), "repeated-time");
    expect(repeated).toMatchObject({ severity: "blocks", line: 4, place: "line 4" });
    expect(repeated.message).toContain("1 s stands on line 3 and line 4");
    expect(traces(repaired("repeated-times.csv", "repeated-time", "Keep the first reading")).R1).toEqual([
      [0, 1, 2, 3],
      [0.01, 0.015, 0.019, 0.022],
    ]);
    expect(traces(repaired("repeated-times.csv", "repeated-time", "Take their mean")).R2?.[1]).toEqual([
      0.02, 0.032, 0.04, 0.048,
    ]);
  });

  it("names the line where time falls, and sorts when asked", () => {
    expect(issue(read("falling-times.csv"), "falling-time").message).toContain(
      "from 3 s on line 4 to 2 s on line 5",
    );
    expect(traces(repaired("falling-times.csv", "falling-time", /^Sort/)).R1).toEqual([
      [0, 1, 2, 3, 4],
      [0.01, 0.015, 0.019, 0.022, 0.025],
    ]);
  });

  it("suspects another run where time starts again", () => {
    expect(issue(read("time-starts-again.csv"), "falling-time").message).toContain("another run begins");
    expect(
      repaired("time-starts-again.csv", "falling-time", "Read up to line 11 only").traces[0]?.signal,
    ).toHaveLength(10);
  });

  it("allows one run, equal runs, zero and falling signals: the law says what they are worth", () => {
    expect(blocking(read("one-run.csv"))).toEqual([]);
    expect(blocking(read("equal-runs.csv"))).toEqual([]);
    expect(issue(read("equal-runs.csv"), "equal-traces").message).toContain(
      "All traces hold the very same readings",
    );
    expect(blocking(read("zero-and-falling-signal.csv"))).toEqual([]);
  });

  it("leaves words for 'no reading' out and names them", () => {
    const reading = read("nan-and-inf.csv");
    expect(reading.issues.filter((one) => one.code === "no-reading").map((one) => one.place)).toEqual([
      "line 3, R1",
      "line 4, R2",
    ]);
    expect(traces(reading).R1?.[0]).toEqual([0, 2, 3, 4]);
  });

  it("blocks a line with more cells than the others", () => {
    expect(issue(read("too-long-lines.csv"), "long-line")).toMatchObject({ severity: "blocks", line: 3 });
    expect(blocking(repaired("too-long-lines.csv", "long-line", "Leave line 3 out"))).toEqual([]);
  });

  it("names an unclosed quotation mark", () => {
    expect(issue(read("open-quote.csv"), "broken-quotes")).toMatchObject({ severity: "blocks", line: 1 });
    expect(blocking(repaired("open-quote.csv", "broken-quotes", /plain/))).toEqual([]);
  });

  it("blocks numbers beyond a double", () => {
    expect(
      read("huge-and-tiny.csv")
        .issues.filter((one) => one.code === "unreadable-cell")
        .map((one) => one.line),
    ).toEqual([2, 4]);
  });

  it("gives a name that stands twice the next free labels, and refuses a label taken twice", () => {
    expect(read("same-run-twice.csv").traces.map((trace) => trace.label)).toEqual(["R1", "R2"]);
    const twice = read("same-run-twice.csv", { labels: { c1: "R7", c2: "R7" } });
    expect(issue(twice, "run-taken-twice")).toMatchObject({ severity: "blocks", column: 2 });
  });

  it("blocks more readings than a study holds, without reading on", () => {
    const crowded: StudyContext = { ...EMPTY_STUDY, points: 4_999_997 };
    expect(issue(read("comma-point.csv", {}, crowded), "too-many-points").severity).toBe("blocks");
  });

  it("blocks while the set-up does not say what the signal is", () => {
    expect(blocking(read("one-run.csv", {}, { ...EMPTY_STUDY, signal: null }))).toEqual(["no-signal-model"]);
  });
});

describe("a cell far longer than any name", () => {
  const long = `A${" ".repeat(40_000)}0x`;
  const rows = Array.from({ length: 20 }, (_, i) => `${i},${i / 10}`).join("\n");

  it.each([
    ["a name", `"t / s","${long}"\n${rows}`],
    ["a unit", `t,c\ns,"${long}"\n${rows}`],
    ["a line of its own", `t,c\n"${long}",1\n${rows}`],
  ])("where %s stands is read in time that grows with its length", (_, text) => {
    const context: StudyContext = {
      ...EMPTY_STUDY,
      species: [{ id: "a", symbol: "A", name: "ester", unit: "mol/L" }],
    };
    const start = process.cpuUsage();
    expect(readTable(textTable(new TextEncoder().encode(text), {}), context, {}).status).toBe("read");
    // With the square of its length it takes ten seconds and more.
    expect(process.cpuUsage(start).user / 1e6).toBeLessThan(2);
  });
});
