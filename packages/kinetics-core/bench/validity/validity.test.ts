import { describe, expect, it } from "vitest";
import { leastCovered, mostRuledOut } from "./limits";
import { sectionNamed } from "./sections";
import { courseTo, SHAPES } from "./shapes";
import { joinColumns, simulateReplicates } from "./simulate-replicates";
import { binomialQuantile, countOnes } from "./statistics";

/** A small part of the simulations with the same seeds: enough to see an interval that has lost its meaning. */

const REPLICATES = 5;

/** Every so many cells of a section, and the columns that hold whether the library's own interval covers the truth. */
const PARTS: readonly { readonly name: string; readonly every: number; readonly own: RegExp }[] = [
  { name: "initial-rates", every: 7, own: /^covered$/ },
  { name: "study-rule", every: 11, own: /^upper .* covered$/ },
  { name: "orders", every: 4, own: /^rule .* covered$/ },
  { name: "global-fit", every: 7, own: /^random .* covered$/ },
  { name: "trace-order", every: 19, own: /^known covered$/ },
];

it.each(PARTS)("$name cover the truth about as often as they say", ({ name, every, own }) => {
  const joined = joinColumns(partsOf(name, every).map(({ columns }) => columns));
  const columns = Object.entries(joined).flatMap(([column, values]) => (own.test(column) ? [values] : []));
  expect(columns.length).toBeGreaterThan(0);
  for (const column of columns) {
    expect(countOnes(column)).toBeGreaterThanOrEqual(leastCovered(column.length));
  }
});

it("readings hardly ever rule out the true law", () => {
  const parts = partsOf("readings", 5);
  const ruledOut = parts.map(({ cell, columns }) => countOnes(columns[`${cell.split(",")[0]} ruled-out`]));
  const all = ruledOut.reduce((sum, count) => sum + count, 0);
  expect(parts[0]?.columns["simple ruled-out"]).toHaveLength(REPLICATES);
  expect(all).toBeLessThanOrEqual(mostRuledOut(parts.length * REPLICATES));
});

function partsOf(name: string, every: number) {
  const section = sectionNamed(name);
  if (section === null) throw new Error(`There is no section ${name}`);
  return section.cellNames.flatMap((cell, place) =>
    place % every === 0 ? [{ cell, columns: simulateReplicates(section, place, 0, REPLICATES) }] : [],
  );
}

describe("a cell", () => {
  it("has the same figures however its replicates are parted among workers", () => {
    const section = sectionNamed("orders");
    if (section === null) throw new Error("no section");
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
