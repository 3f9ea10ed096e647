import { describe, expect, it } from "vitest";
import { leastCovered } from "./limits";
import type { AnySection, Columns } from "./section";
import { SECTIONS } from "./sections";
import { courseTo, SHAPES } from "./shapes";
import { joinColumns, simulateReplicates } from "./simulate-replicates";
import { binomialQuantile, countOnes } from "./statistics";

/** A small part of the simulations with the same seeds: enough to see an interval that has lost its meaning. */

const REPLICATES = 8;
/** Every so many cells of a section. */
const EVERY: Readonly<Record<string, number>> = { "initial-rates": 4, "study-rule": 7, orders: 2 };

it.each(SECTIONS.map((section) => ({ name: section.name, section })))(
  "$name cover the truth about as often as they say",
  ({ name, section }) => {
    const every = EVERY[name] ?? 3;
    const cells = section.cellNames.flatMap((_, cell) => (cell % every === 0 ? [cell] : []));
    const columns = coverageColumns(cells.map((cell) => simulateReplicates(section, cell, 0, REPLICATES)));
    expect(columns.length).toBeGreaterThan(0);
    for (const column of columns) {
      expect(countOnes(column)).toBeGreaterThanOrEqual(leastCovered(column.length));
    }
  },
);

/** The rule's own columns of zeros and ones, each over all cells. */
function coverageColumns(parts: readonly Columns[]): readonly Float64Array[] {
  const joined = joinColumns(parts);
  return Object.entries(joined).flatMap(([column, values]) =>
    /(^|\s)covered$/.test(column) && !/^(lower|clock) /.test(column) ? [values] : [],
  );
}

describe("a cell", () => {
  const section: AnySection | undefined = SECTIONS.find(({ name }) => name === "orders");

  it("has the same figures however its replicates are parted among workers", () => {
    if (section === undefined) throw new Error("no section");
    const whole = simulateReplicates(section, 3, 0, 12);
    const parted = joinColumns([simulateReplicates(section, 3, 0, 5), simulateReplicates(section, 3, 5, 12)]);
    expect(parted).toEqual(whole);
  });
});

describe("the limits", () => {
  it("are those of a binomial: of 500 at 92.5 % not under 447, of 3,000 not under 2737 (computed with SciPy 1.17)", () => {
    expect(binomialQuantile(0.005, 500, 0.925)).toBe(447);
    expect(binomialQuantile(0.005, 3000, 0.925)).toBe(2737);
  });
});

describe("the shapes", () => {
  it.each(SHAPES)("$name starts with slope 1 and ends at its conversion", (shape) => {
    expect(shape.elapsed(1e-6) / 1e-6).toBeCloseTo(1, 4);
    const course = courseTo(shape, 0.7, 9);
    expect(course[0]).toBeCloseTo(0, 12);
    expect(course[8]).toBeCloseTo(0.7, 12);
    expect(shape.elapsed(course[4] ?? 0)).toBeCloseTo(shape.elapsed(0.7) / 2, 10);
  });
});
