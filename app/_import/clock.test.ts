import { describe, expect, it } from "vitest";
import { clockKind, clockOfColumn, elapsedSeconds, isMinutesSeconds, readClock } from "./clock";

describe("clocks", () => {
  it.each([
    ["10:02:11", "clock"],
    ["10:02:11,25", "clock"],
    ["1:02:11 PM", "clock"],
    ["26:15:00", "clock"],
    ["01.03.2026 10:02:11", "clock"],
    ["3/1/2026, 10:02", "clock"],
    ["10:02", "two-parts"],
    ["0:30.5", "two-parts"],
    ["2026-03-01T10:02:11.250Z", "moment"],
    ["2026-03-01 10:02", "moment"],
    ["2026-03-01T10:02:11+0100", "moment"],
    ["10:72", null],
    ["1:2", null],
    ["0.5", null],
    ["12-03", null],
  ] as const)("%s is read as %s", (cell, kind) => {
    expect(clockKind(cell)).toBe(kind);
  });

  it("give seconds", () => {
    expect(readClock("10:02:11.25", "clock")).toBe(36_131.25);
    expect(readClock("12:00:01 AM", "clock")).toBe(1);
    expect(readClock("1:02 pm", "clock")).toBe(46_920);
    expect(readClock("10:02", "hours-minutes")).toBe(36_120);
    expect(readClock("10:02", "minutes-seconds")).toBe(602);
    expect(readClock("01.03.2026 10:02", "clock")).toBe(36_120);
    expect(readClock("stopped", "clock")).toBeNull();
  });

  it("give moments whatever the time zone is written like", () => {
    const moments = [
      "2026-03-01T10:02:11Z",
      "2026-03-01 11:02:11+01:00",
      "2026-03-01T11:02:11+0100",
      "2026-03-01T10:02:11",
    ];
    expect(new Set(moments.map((cell) => readClock(cell, "moment"))).size).toBe(1);
    expect(readClock("2026-02-31T10:00:00Z", "moment")).toBeNull();
  });

  it("are a column's when nine of ten entries are", () => {
    expect(clockOfColumn(["10:00:00", "10:00:01"])).toBe("clock");
    expect(clockOfColumn(["10:00:59", "10:01", "10:02:01"])).toBe("clock");
    expect(clockOfColumn(["0.1", "10:00:01"])).toBeNull();
    expect(isMinutesSeconds(["00:30", "59:30"])).toBe(true);
    expect(isMinutesSeconds(["00:30", "01:00"])).toBe(false);
  });

  it("count from the first reading, over midnight too", () => {
    const cells = ["23:59:59.9", "00:00:00.1", "00:00:01"].map(
      (cell) => readClock(cell, "clock") ?? Number.NaN,
    );
    expect(elapsedSeconds(Float64Array.from(cells), "clock")).toEqual({
      time: Float64Array.from([0, 0.2, 1.1]),
      midnights: 1,
    });
    // A step back by seconds is a fault of the file and stays one.
    expect(elapsedSeconds(Float64Array.from([10, 5]), "clock").time[1]).toBe(-5);
  });
});
