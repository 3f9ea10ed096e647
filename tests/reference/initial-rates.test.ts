import { columnOf, dot, householderQr, invertUpper, matrixFromColumns } from "kinetics-core/linear-algebra";
import {
  type ConcentrationUnit,
  rateConstantUnit,
  type TimeUnit,
  timeToSeconds,
} from "kinetics-core/quantities";
import { fitRateLaw, type RateLawFit, type RateLawInput } from "kinetics-core/rate-law";
import { describe, expect, it } from "vitest";
import fixture from "./initial-rates.fixture.json";

/**
 * Published initial-rate tables: the orders that the source prints (or that its figures give), and k to its last
 * printed digit with those orders held. Sources and what is wrong with some of them stand in the fixture.
 */
type Table = (typeof fixture.sets)[number];

function inputOf(table: Table, changes: Partial<RateLawInput> = {}): RateLawInput {
  return {
    species: table.species,
    runs: table.concentrations.map((row, j) => ({
      label: `run ${j + 1}`,
      concentrations: Object.fromEntries(table.species.map((name, i) => [name, row[i] ?? 0])),
      rate: table.rates[j] ?? 0,
    })),
    concentrationUnit: table.concentrationUnit as ConcentrationUnit,
    timeUnit: table.timeUnit as TimeUnit,
    ...changes,
  };
}

function fitted(input: RateLawInput): RateLawFit {
  const result = fitRateLaw(input);
  if (result.status !== "fitted") throw new Error(`expected a law, got ${result.status}: ${result.message}`);
  return result;
}

function tableOf(id: string): Table {
  const table = fixture.sets.find((one) => one.id === id);
  if (!table) throw new Error(`no table ${id} in the fixture`);
  return table;
}

function heldOrders(table: Table): Record<string, number> {
  return Object.fromEntries(table.species.map((name, i) => [name, table.orders[i] ?? 0]));
}

/** How far rounding of the printed rates to their last digit can move each order in a plain log-log fit. */
function roundingOfOrders(table: Table): readonly number[] {
  const { q, r } = householderQr(
    matrixFromColumns([
      table.rates.map(() => 1),
      ...table.species.map((_, i) => table.concentrations.map((row) => Math.log(row[i] ?? 1))),
    ]),
  );
  const inverse = invertUpper(r);
  return table.species.map((_, i) =>
    table.rates.reduce((sum, rate, j) => {
      const lastDigit = 10 ** (Math.floor(Math.log10(rate)) - table.rateDigits + 1);
      const row = Float64Array.from({ length: r.columns }, (_unused, k) => columnOf(inverse, k)[i + 1] ?? 0);
      const projections = Float64Array.from({ length: r.columns }, (_unused, k) => columnOf(q, k)[j] ?? 0);
      return sum + Math.abs(dot(row, projections)) * (lastDigit / 2 / rate);
    }, 1e-9),
  );
}

const memory = (knownBy: string) => (knownBy === "memory" ? ", k from memory and not seen in print" : "");

it("holds all twenty tables", () => {
  expect(fixture.sets).toHaveLength(20);
});

describe.each(fixture.sets.map((table) => [table.id, table] as const))("%s", (_, table) => {
  const { title, publisher } = table.source;
  const source = `${title} (${publisher})`;

  it(`free orders are ${table.orders.join(", ")} within the rounding of the rates: ${source}; ${table.ordersKnownBy}`, () => {
    const law = fitted(inputOf(table));
    const rounding = roundingOfOrders(table);
    expect(law.separable).toBe(true);
    table.species.forEach((name, i) => {
      const order = law.orders[name]?.estimate ?? Number.NaN;
      expect(Math.abs(order - (table.orders[i] ?? 0)), `order in ${name}`).toBeLessThanOrEqual(
        rounding[i] ?? 0,
      );
      expect(law.simpleOrders.orders[name]).toBe(table.orders[i]);
      const readings = law.degreesOfFreedom === 0 ? ["nearest"] : ["is", "consistent"];
      expect(readings, `reading of the order in ${name}`).toContain(law.simpleOrders.reading[name]);
    });
  });

  it("k with the orders held is the geometric mean of the runs' own constants, and simple orders give the same", () => {
    const held = fitted(inputOf(table, { orders: heldOrders(table) }));
    const free = fitted(inputOf(table));
    const k = held.rateConstant.estimate ?? Number.NaN;
    expect(Math.abs(k / table.computedK - 1)).toBeLessThan(5e-5);
    expect((free.simpleOrders.rateConstant.estimate ?? Number.NaN) / k).toBeCloseTo(1, 12);
    expect(free.simpleOrders.rateConstant.unit).toBe(held.rateConstant.unit);
  });

  it("says what three or four runs cannot tell", () => {
    const law = fitted(inputOf(table));
    const freedom = table.rates.length - table.species.length - 1;
    expect(law.degreesOfFreedom).toBe(freedom);
    const flag = law.flags.find((one) => one.code === (freedom === 0 ? "no-freedom" : "little-freedom"));
    expect(flag?.severity).toBe(freedom === 0 ? "blocks" : "weakens");
    for (const name of table.species) expect(law.orders[name]?.interval === null).toBe(freedom === 0);
  });
});

describe("k to its last printed digit, orders held", () => {
  const printed = fixture.sets.flatMap((table) => (table.k === null ? [] : [{ table, k: table.k }]));
  it("is printed in ten of the tables", () => {
    expect(printed).toHaveLength(10);
  });

  it.each(
    printed
      .filter(({ table }) => table.id !== "os-penicillin")
      .map(({ table, k }) => [table.id, k.value, k.unit, memory(k.knownBy), table, k] as const),
  )("%s: %d %s%s", (_id, value, unit, _memory, table, k) => {
    const law = fitted(inputOf(table, { orders: heldOrders(table) }));
    expect(law.rateConstant.estimate?.toPrecision(k.significantDigits)).toBe(
      value.toPrecision(k.significantDigits),
    );
    expect(law.rateConstant.unit).toBe(unit);
  });
});

describe("faults of the sources", () => {
  it("2NO + Cl2: the printed k is that of the loss of NO; divided by its stoichiometric number the rate of reaction has 1.5", () => {
    const table = tableOf("os-no-cl2-a");
    const input = inputOf(table, { orders: heldOrders(table) });
    const ofReaction = fitted({ ...input, runs: input.runs.map((run) => ({ ...run, rate: run.rate / 2 })) });
    expect(ofReaction.rateConstant.estimate).toBeCloseTo(1.5, 12);
    expect(fitted(input).rateConstant.estimate).toBeCloseTo(3, 12);
  });

  it("2NOCl: 8.0e-8 belongs to the hour; per second, as a later page has it, the same runs give 2.2e-11", () => {
    const table = tableOf("os-nocl");
    const perHour = fitted(inputOf(table, { orders: heldOrders(table) }));
    expect(perHour.rateConstant.unit).toBe("L mol^-1 h^-1");
    expect(perHour.rateConstant.estimate?.toPrecision(2)).toBe("8.0e-8");
    const input = inputOf(table, { orders: heldOrders(table), timeUnit: "s" });
    const perSecond = fitted({
      ...input,
      runs: input.runs.map((run) => ({ ...run, rate: run.rate / timeToSeconds(1, "h") })),
    });
    expect(perSecond.rateConstant.unit).toBe("L mol^-1 s^-1");
    expect(perSecond.rateConstant.estimate?.toPrecision(2)).toBe("2.2e-11");
  });

  it("penicillin: the runs alone give 5.0e-5 min^-1; with the enzyme as a species of held order 1 k is the printed 1.0e7", () => {
    const table = tableOf("os-penicillin");
    const alone = fitted(inputOf(table));
    expect(alone.simpleOrders.rateConstant.estimate?.toPrecision(2)).toBe("0.000050");
    expect(alone.simpleOrders.rateConstant.unit).toBe("min^-1");

    const input = inputOf(table, { species: ["penicillin", "enzyme"], orders: { penicillin: 1, enzyme: 1 } });
    const withEnzyme = {
      ...input,
      runs: input.runs.map((run) => ({ ...run, concentrations: { ...run.concentrations, enzyme: 5e-12 } })),
    };
    const held = fitted(withEnzyme);
    expect(held.rateConstant.estimate?.toPrecision(2)).toBe("1.0e+7");
    expect(held.rateConstant.unit).toBe(table.k?.unit);

    const free = fitted({ ...withEnzyme, orders: {} });
    expect(free.separable).toBe(false);
    expect(free.orders.enzyme?.estimate).toBeNull();
    expect(free.orders.penicillin?.estimate).toBeCloseTo(1, 9);
    expect(free.rateConstant.estimate).toBeNull();
    expect(free.undetermined[0]?.message).toContain("enzyme was the same in every run");
  });

  it("bromate: the arithmetic gives the order 2 to H+, whatever one sentence of the page says", () => {
    const law = fitted(inputOf(tableOf("classic-bromate")));
    expect(law.orders["H+"]?.estimate).toBeCloseTo(2, 9);
    expect(law.orders["Br-"]?.estimate).toBeCloseTo(1, 9);
  });

  it("order 3/2: the misprinted third rate of one copy gives a negative order, the data neither that nor 1/2", () => {
    const table = tableOf("ncert-frac");
    const misprinted = fitted(inputOf({ ...table, rates: [5.07e-5, 5.07e-5, 1.43e-5] }));
    expect(misprinted.orders.A?.estimate ?? 0).toBeLessThan(-1);
    expect(fitted(inputOf(table)).simpleOrders.orders.A).toBe(1.5);
    expect(fitted(inputOf(table)).simpleOrders.rateConstant.unit).toBe("L^0.5 mol^-0.5 s^-1");
  });

  it("peroxydisulfate: the misprinted second rate of one copy leaves no order that may be claimed, and k without it is right", () => {
    const table = tableOf("blm-s2o8-i");
    const misprinted = fitted(
      inputOf({ ...table, rates: [2.6e-6, 3.9e-5, 7.8e-6, 1.4e-5] }, { orders: heldOrders(table) }),
    );
    const without = misprinted.leaveOneOut.find((one) => one.label === "run 2");
    expect((without?.rateConstant ?? 0).toPrecision(2)).toBe(table.computedK.toPrecision(2));
    const flag = misprinted.flags.find((one) => one.code === "influential-run");
    expect(flag?.message).toContain("run 2");
    expect(Object.values(fitted(inputOf(table)).simpleOrders.reading)).toEqual(["consistent", "consistent"]);
    expect(fitted(inputOf(table)).pairs.some((pair) => pair.species === "I-")).toBe(false);
  });

  it("hydrogen peroxide: 0.0115 per second is the 0.69 per minute of Liebhafsky and Mohammad (1933)", () => {
    const table = tableOf("textbook-h2o2-i");
    const law = fitted(inputOf(table, { orders: heldOrders(table) }));
    expect(((law.rateConstant.estimate ?? 0) * timeToSeconds(1, "min")).toPrecision(2)).toBe("0.69");
    expect(rateConstantUnit(2, "mol/L", "min")).toBe("L mol^-1 min^-1");
  });
});
