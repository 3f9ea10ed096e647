import { describe, expect, it } from "vitest";
import { powerEquation } from "../power-equation";
import { equationValue, type RateEquation } from "../rate-equation";
import { saturatingEquation } from "../saturating-equation";
import { expressionEquation } from "./expression-equation";

const SPECIES = ["A", "B", "P", "S"];

function read(text: string) {
  const made = expressionEquation(text, { species: SPECIES });
  if (made.status !== "equation") throw new Error(made.message);
  return made;
}

function values(equation: RateEquation, c: readonly number[], theta: readonly number[]) {
  const into = equationValue(equation);
  const hasValue = equation.evaluate(Float64Array.from(c), Float64Array.from(theta), into);
  return hasValue ? [into.f, ...into.byConcentration, ...into.byParameter] : null;
}

describe("the laws that are built in, written out", () => {
  it("give the same rates and derivatives", () => {
    const cases: readonly [string, RateEquation, number[], number[]][] = [
      ["k [A]^a [B]^b", powerEquation(["A", "B"]), [0.3, 0.02], [1.3, -0.4]],
      ["k [A]^2/[B]", powerEquation(["A", "B"], [2, -1]), [0.3, 0.02], []],
      ["V [S]/(K + [S])", saturatingEquation({ saturating: "S" }), [0.3], [0.1]],
    ];
    for (const [text, builtIn, c, theta] of cases) {
      const expected = values(builtIn, c, theta)?.map((value) => expect.closeTo(value, 13));
      expect(values(read(text).equation, c, theta)).toEqual(expected);
    }
  });

  it("treat a used-up species alike", () => {
    const equation = read("k [A]^a [B]").equation;
    const builtIn = powerEquation(["A", "B"], ["free", 1]);
    for (const [a, order] of [
      [0, 0.5],
      [0, 1],
      [0, 2],
      [0, -1],
      [0, 0],
      [-1, 1],
    ] as const) {
      expect(values(equation, [a, 0.2], [order])).toEqual(values(builtIn, [a, 0.2], [order]));
    }
    expect(values(read("k sqrt([A]) [B]").equation, [0, 0.2], [])).toEqual([0, 0, 0]);
  });

  it("have no value where a logarithm or a quotient has none", () => {
    expect(values(read("k [A]/[B]").equation, [0.1, 0], [])).toBeNull();
    expect(values(read("k ln([A])").equation, [0], [])).toBeNull();
    expect(values(read("k ([A] − [B])^0.5").equation, [0.1, 0.2], [])).toBeNull();
    expect(values(read("k exp(1000 [A])").equation, [1], [])).toBeNull();
  });

  it("keep whole powers of what is negative", () => {
    expect(values(read("k ([A] − [B])^3").equation, [1, 3], [])).toEqual([-8, 12, -12]);
    expect(values(read("k ([A] − [B])^5").equation, [1, 3], [])).toEqual([-32, 80, -80]);
    expect(values(read("k ([A] − [B])").equation, [1, 1], [])).toEqual([0, 1, -1]);
  });
});

describe("the rate constant", () => {
  it.each<[text: string, name: string, written: boolean, parameters: string[]]>([
    ["k [A]^a", "k", true, ["a"]],
    ["k_1 [A]", "k_1", true, []],
    ["V [S]/(K + [S])", "V", true, ["K"]],
    ["[S]/(K + [S])", "k", false, ["K"]],
    ["[A]^a", "k", false, ["a"]],
    ["k1 [A] + k2 [A] [B]", "k1", true, ["k2/k1"]],
    ["a [A] + k [A] [B]", "k", true, ["a/k"]],
    ["(k [A] − r [P])/(1 + K [P])", "k", true, ["r/k", "K"]],
    ["k ([A]^2 + β)", "k", true, ["β"]],
    ["sqrt(k k [A])", "k", true, []],
  ])("of %s", (text, name, written, parameters) => {
    const { rateConstant, equation } = read(text);
    expect({ name: rateConstant.name, written: rateConstant.written }).toEqual({ name, written });
    expect(equation.parameters.map((one) => one.name)).toEqual(parameters);
  });

  it("leaves f as v over it, ratios to it included", () => {
    const equation = read("a [A] + k [A] [B]").equation;
    // At k = 2 and a = 6 the rate is 6·0.5 + 2·0.5·0.25.
    expect(2 * (values(equation, [0.5, 0.25], [6 / 2])?.[0] ?? Number.NaN)).toBeCloseTo(3.25, 14);
  });

  it.each<[text: string, caret: string, message: string]>([
    ["k [A] + [B]", "        ^^^", "multiplies one side of the sum and not this one"],
    ["[B] + k [A]", "^^^", "multiplies one side of the sum and not this one"],
    ["exp(k [A])", "   ^^^^^^^", "must multiply the whole rate"],
    ["[A]/tau", "^^^^^^^", "to the power −1"],
    ["k^2 [A]", "^^^^^^^", "to the power 2"],
    ["[A]^k", "    ^", "must multiply the whole rate"],
  ])("must be a factor: %s", (text, caret, message) => {
    const made = expressionEquation(text, { species: SPECIES });
    if (made.status === "equation") throw new Error(made.equation.law);
    expect(made.code).toBe("rate-constant-not-a-factor");
    expect(" ".repeat(made.position) + "^".repeat(made.length)).toBe(caret);
    expect(made.message).toContain(message);
  });
});

describe("what is known of the equation", () => {
  it("species in the order of the reaction, used ones only", () => {
    expect(read("k [P] [A]").equation.species).toEqual(["A", "P"]);
  });

  it.each<[text: string, theta: number[], overall: number | undefined, powers: (number | undefined)[]]>([
    ["k [A]^a [B]^b", [1.5, 0.5], 2, [0, 0]],
    ["k ([A]^a + β [B])", [1.5, 1], 1.5, [0, 0.5]],
    ["k ([A]^a + β [B])", [0, 1], 0, [0, -1]],
    ["V [S]/(K + [S])", [1], 0, [1]],
    ["k [A]/(1 + K [P])", [1], 1, [-1]],
    ["k1 [A] + k2 [A] [B]", [1], 1, [-1]],
    ["k sqrt([A]/K)", [1], undefined, [undefined]],
    ["k exp(−[A]/c)", [1], 0, [1]],
    ["k (2 + [A])", [], undefined, []],
    ["k exp([A])", [], undefined, []],
  ])("units of %s", (text, theta, overall, powers) => {
    const { overallOrder, parameters } = read(text).equation;
    expect(overallOrder?.(theta)).toEqual(overall === undefined ? undefined : expect.closeTo(overall, 6));
    expect(parameters.map(({ concentrationPower }) => concentrationPower?.(theta))).toEqual(
      powers.map((power) => (power === undefined ? undefined : expect.closeTo(power, 6))),
    );
  });

  it.each([
    ["k [A]^a/(1 + K [P])", false],
    ["k exp(−[A])", false],
    ["k ([A] − [P]/K)", true],
    ["k ([A] − [P])^2", false],
    ["k ln([A])", true],
    ["−k [A]", true],
  ])("%s may change its sign: %s", (text, reversible) => {
    expect(read(text).equation.reversible).toBe(reversible);
  });

  it("starts and bounds by the kind of the parameter", () => {
    const made = expressionEquation("k [A]^a/(K + [A])", {
      species: SPECIES,
      typical: () => 0.2,
      start: (name) => (name === "a" ? 0.5 : undefined),
    });
    if (made.status !== "equation") throw new Error(made.message);
    expect(made.equation.parameters).toMatchObject([
      { name: "a", kind: "order", start: 0.5, bounds: [-3, 5] },
      { name: "K", kind: "constant", start: expect.closeTo(0.2, 12), bounds: [0, expect.closeTo(2e5, 3)] },
    ]);
  });

  it("its law reads as it was written", () => {
    expect(read("V*[S]/(K+[S])").equation.law).toBe("v = V [S]/(K + [S])");
    expect(read("[S]/(K+[S])").equation.law).toBe("v = k ([S]/(K + [S]))");
  });
});

describe("one name in several places", () => {
  it("gathers what every place says of it", () => {
    const c = 0.3;
    const n = 1.2;
    const f = c ** (n + 1) * 0.5 ** n;
    expect(values(read("k [A] [A]^n [B]^n").equation, [c, 0.5], [n])).toEqual(
      [f, ((n + 1) * f) / c, (n * f) / 0.5, f * Math.log(c * 0.5)].map((value) => expect.closeTo(value, 14)),
    );
    expect(values(read("k [A]^n [A]^n").equation, [c], [n])).toEqual(
      [c ** 2.4, 2.4 * c ** 1.4, 2 * c ** 2.4 * Math.log(c)].map((value) => expect.closeTo(value, 14)),
    );
    expect(values(read("k n [A]^n").equation, [c], [n])).toEqual(
      [n * c ** n, n * n * c ** (n - 1), c ** n * (1 + n * Math.log(c))].map((value) =>
        expect.closeTo(value, 14),
      ),
    );
  });
});

describe("limits", () => {
  it("eleven parameters are too many", () => {
    const text = `k (${"abcdfghijl".split("").join(" + ")})`;
    expect(expressionEquation(text, { species: [] })).toMatchObject({
      code: "too-many-names",
      position: 39,
      length: 1,
    });
  });

  it.each([
    ["k/0", 0, 3],
    ["k (1 + ln(0))", 7, 5],
    ["k sqrt(1 − 2)", 2, 11],
    ["k exp(1000)", 2, 9],
  ])("%s has no value", (text, position, length) => {
    expect(expressionEquation(text, { species: [] })).toMatchObject({
      code: "constant-without-value",
      position,
      length,
    });
  });

  it("names of an object's own reach nothing", () => {
    const { equation } = read("k constructor toString hasOwnProperty [A]");
    expect(equation.parameters.map(({ name }) => name)).toEqual([
      "constructor",
      "toString",
      "hasOwnProperty",
    ]);
    expect(values(equation, [0.5], [2, 3, 4])).toEqual([12, 24, 6, 4, 3]);
    expect(expressionEquation("k [constructor]", { species: SPECIES })).toMatchObject({
      code: "species-unknown",
    });
  });
});
