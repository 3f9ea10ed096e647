import { describe, expect, it } from "vitest";
import { blocking, issue, read, repaired, TWO_RUNS, traces } from "./testing-corpus";

describe("times that a clock gave", () => {
  it.each(["clock-of-day.csv", "stopwatch.csv", "iso-stamps-long.tsv"])("%s becomes seconds", (file) => {
    const reading = read(file);
    expect(reading.timeUnit).toMatchObject({ value: "s", basis: "file" });
    expect(traces(reading)).toEqual(TWO_RUNS);
    expect(blocking(reading)).toEqual([]);
  });

  it("says from where it counts, and counts otherwise when asked", () => {
    expect(issue(read("clock-of-day.csv"), "clock-times")).toMatchObject({
      severity: "weakens",
      message: expect.stringContaining("own first reading (“10:02:11”)"),
    });
    expect(issue(read("stopwatch.csv"), "clock-times").severity).toBe("note");
    const kept = repaired("clock-of-day.csv", "clock-times", "Keep the times as written");
    expect(kept.traces[0]?.timeSeconds[0]).toBe(36_131);
  });

  it("asks what two parts mean", () => {
    expect(blocking(read("two-part-clock.csv"))).toEqual(["clock-form"]);
    const minutes = repaired("two-part-clock.csv", "clock-form", "Read as minutes and seconds");
    expect(blocking(minutes)).toEqual([]);
    expect([...(minutes.traces[0]?.timeSeconds ?? [])]).toEqual([0, 30, 75, 120]);
    const hours = repaired("two-part-clock.csv", "clock-form", "Read as hours and minutes");
    expect([...(hours.traces[0]?.timeSeconds ?? [])]).toEqual([0, 1800, 4500, 7200]);
  });

  it("passes midnight and names a clock that cannot be read", () => {
    const over = read("over-midnight.csv");
    expect([...(over.traces[0]?.timeSeconds ?? [])]).toEqual([0, 1, 2.5, 4]);
    expect(issue(over, "midnight").message).toContain("passes midnight 1 time");
    expect(issue(read("broken-clock.csv"), "unreadable-cell")).toMatchObject({ line: 3, column: 0 });
  });

  it("leaves a clock out beside a column of elapsed times", () => {
    expect(read("counter-and-clock.csv").columns[1]).toMatchObject({
      role: "left-out",
      reason: "clock times, beside another column of time",
    });
  });
});
