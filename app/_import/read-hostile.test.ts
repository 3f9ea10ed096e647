import { describe, expect, it } from "vitest";
import { readFile } from "./read-file";
import type { Reading } from "./reading";
import { EMPTY_STUDY } from "./testing-context";
import { blocking, issue, read, repaired } from "./testing-corpus";

describe("cells with a mark beside the number", () => {
  it("are asked about, and read or left out as answered", () => {
    const file = "flag-cells.csv";
    expect(blocking(read(file))).toEqual(["flagged-cells"]);
    expect(issue(read(file), "flagged-cells").message).toMatch(/^4 cells carry a mark.*line 3 “0\.20\*”/);
    const without = repaired(file, "flagged-cells", "Leave these cells out");
    expect([...(without.traces[0]?.signal ?? [])]).toEqual([0.1, 0.6, 0.7, 0.8]);
    const withThem = repaired(file, "flagged-cells", "Read the numbers");
    expect([...(withThem.traces[0]?.signal ?? [])]).toEqual([0.1, 0.2, 0.3, 0.4, 0.5, 0.6, 0.7, 0.8]);
    expect(blocking(withThem)).toEqual([]);
  });
});

describe("hostile files are read or refused, and never thrown at", () => {
  const answer = (text: string): Promise<Reading> =>
    readFile(new TextEncoder().encode(text), EMPTY_STUDY, {});

  it.each([
    ["a line of 5 MB", `t,${"1".repeat(5_000_000)}\n0,1\n1,2\n2,3\n`, "read"],
    ["five million separators", `t,a\n0,1\n1,2\n${",".repeat(5_000_000)}`, "read"],
    ["a cell of clocks", `t,a\n${"1:".repeat(100_000)},1\n10:00:00,1\n10:00:01,2\n`, "read"],
    ["a field of blanks", `t a\n0${" ".repeat(500_000)}1\n1 2\n2 3\n`, "read"],
    ["two thousand titles", "##TITLE=a\n".repeat(2000), "refused"],
  ])("%s", async (_, text, status) => {
    expect((await answer(text)).status).toBe(status);
  });

  it("5,000 columns are counted and refused", async () => {
    const row = (cells: readonly unknown[]) => cells.join(",");
    const numbers = Array.from({ length: 5000 }, (_, i) => i / 1000);
    const text = [row(["t", ...numbers.map((_, i) => `R${i}`)]), row([0, ...numbers]), row([1, ...numbers])];
    expect(await answer(text.join("\n"))).toMatchObject({
      status: "refused",
      message: expect.stringContaining("5001 cells"),
    });
  });

  it("NUL bytes and formulas are named, and formulas never computed", async () => {
    expect(await answer("t,a\n0,1\n\u00001,2\n")).toMatchObject({ status: "refused" });
    const formulas = await answer("t,R1\n0,=1+2\n1,0.2\n2,0.3\n3,0.4\n");
    expect(formulas).toMatchObject({
      issues: [{ code: "unreadable-cell", line: 2, message: "“=1+2” is not a number." }],
    });
  });
});
