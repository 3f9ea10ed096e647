import { describe, expect, it } from "vitest";
import { blocking, issue, read, repaired, TWO_RUNS, traces } from "./testing-corpus";

describe("tables that do not run down in one piece", () => {
  it.each([
    ["titled-blocks.csv", "line 9"],
    ["headed-blocks.csv", "line 8"],
  ])("%s is read as runs below one another, line numbers kept", (file, place) => {
    const reading = read(file);
    expect(traces(reading)).toEqual(TWO_RUNS);
    expect(blocking(reading)).toEqual([]);
    expect(reading.layout.value).toBe("long");
    expect(issue(reading, "blocks")).toMatchObject({ severity: "note", place });
    expect(repaired(file, "blocks", "Read as it stands").traces).toHaveLength(1);
  });

  it("names the line of the file for a fault inside a block", () => {
    expect(
      issue(read("titled-blocks.csv", { cells: [{ line: 10, column: 1, as: 0.032 }] }), "cell-corrected")
        .line,
    ).toBe(10);
  });

  it("turns a table whose times run along a row", () => {
    const reading = read("turned.csv");
    expect(traces(reading)).toEqual(TWO_RUNS);
    expect(blocking(reading)).toEqual([]);
    expect(reading.separator.value).toBe(";");
    expect(issue(reading, "turned").message).toContain("The times run along line 1");
  });

  it("parts runs without a heading between them when asked", () => {
    const reading = repaired("time-starts-again.csv", "falling-time", "Read as runs below one another");
    expect(reading.traces.map(({ label, signal }) => [label, signal.length])).toEqual([
      [reading.traces[0]?.label, 10],
      [reading.traces[1]?.label, 10],
    ]);
    expect(blocking(reading)).toEqual([]);
  });
});
