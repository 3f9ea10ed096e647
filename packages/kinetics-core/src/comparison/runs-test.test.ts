import { describe, expect, it } from "vitest";
import { runsTest } from "./runs-test";

const signs = (text: string) => Array.from(text, (sign) => (sign === "+" ? 0.3 : -0.2));

describe("test of runs of equal sign", () => {
  // p-values counted over all arrangements by a script of its own.
  it.each([
    ["++++----", 2, 0.05714285714285714],
    ["+-+-+-+-", 8, 0.05714285714285714],
    ["++-+--+++-", 6, 1],
    ["+++++++--", 2, 0.1111111111111111],
    ["++--", 2, 0.6666666666666666],
  ] as const)("counts all arrangements of %s", (text, stretches, pValue) => {
    const test = runsTest(signs(text));
    expect(test?.stretches).toBe(stretches);
    expect(test?.pValue).toBeCloseTo(pValue, 12);
    expect(test?.method).toBe("exact");
  });

  it("passes to the normal approximation beyond 40 signs, close to the count of all arrangements", () => {
    const pattern = "++-+--+-++--+-+++--+";
    const normal = runsTest(signs(`${pattern}${pattern}++--`));
    expect([normal?.stretches, normal?.positive, normal?.method]).toEqual([26, 24, "normal"]);
    // Counted with whole numbers of any size.
    expect(Math.abs((normal?.pValue ?? 1) - 0.41101155769928094)).toBeLessThan(0.02);
  });

  it("leaves out residuals of 0, and says nothing where there is nothing to arrange", () => {
    expect(runsTest([0.1, 0, 0.2, -0.1, -0.3])?.positive).toBe(2);
    expect(runsTest(signs("++++++"))).toBeNull();
    expect(runsTest(signs("+-+"))).toBeNull();
  });
});
