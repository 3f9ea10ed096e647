import { describe, expect, it } from "vitest";
import { rateDefinition } from "./rate-definition";
import { emptySetUpForm } from "./set-up-form";
import type { SpeciesForm } from "./set-up-form.schema";
import { cautionsOf, usualCautions, writtenCautions } from "./usual-cautions";

function species(symbol: string, stoichiometricNumber: number, more: Partial<SpeciesForm> = {}): SpeciesForm {
  return {
    id: "",
    symbol,
    name: "",
    formula: "",
    stoichiometricNumber,
    charge: 0,
    role: "reactant",
    inLaw: true,
    unit: "mmol/L",
    followed: false,
    ...more,
  };
}

const rows = [
  species("A", -1),
  species("B", -2, { name: "hydroxide" }),
  species("P", 1, { followed: true }),
  species("", 1),
  species("K", 0),
];

describe("rateDefinition", () => {
  it("divides each change by its signed stoichiometric number and ends with the signal", () => {
    const { terms, words } = rateDefinition({ species: rows, signal: emptySetUpForm.signal });
    expect(terms).toEqual([
      { sign: "−", divisor: "", change: { kind: "species", symbol: "A" } },
      { sign: "−", divisor: "2", change: { kind: "species", symbol: "B" } },
      { sign: "", divisor: "", change: { kind: "species", symbol: "P" } },
      { sign: "", divisor: "", change: { kind: "signal", factor: "*ε* *l*", quantity: "*A*" } },
    ]);
    expect(words).toContain("Hydroxide disappears at twice this rate.");
    expect(words).toContain("*A* is absorbance");
  });

  it("gives the signal the sign and number of the species that is followed", () => {
    const lost = rows.map((row) => ({ ...row, followed: row.symbol === "B" }));
    const { terms } = rateDefinition({
      species: lost,
      signal: { ...emptySetUpForm.signal, quantity: "Conductivity" },
    });
    expect(terms.at(-1)).toEqual({
      sign: "−",
      divisor: "2",
      change: { kind: "signal", factor: "*b*", quantity: "*S*" },
    });
  });

  it("has no signal term where concentrations are read directly", () => {
    const { terms } = rateDefinition({
      species: rows,
      signal: { ...emptySetUpForm.signal, kind: "concentration" },
    });
    expect(terms.every(({ change }) => change.kind === "species")).toBe(true);
  });
});

describe("cautions", () => {
  it("warns of strong alkali, oxidisers and chlorine-releasing agents by formula or name", () => {
    const texts = usualCautions([
      { symbol: "B", name: "hydroxide", formula: "OH-" },
      { symbol: "X", name: "", formula: "H2O2" },
      { symbol: "H", name: "sodium hypochlorite", formula: "" },
      { symbol: "A", name: "sucrose", formula: "C12H22O11" },
    ]);
    expect(texts.map(({ concerns }) => concerns)).toEqual([
      "Hydroxide, B",
      "H2O2, X",
      "Sodium hypochlorite, H",
    ]);
    expect(texts[0]?.text).toContain("alkali");
    expect(texts[1]?.text).toContain("Oxidiser");
    expect(texts[2]?.text).toContain("Never mix with acids or ammonia");
  });

  it("takes written cautions by the line", () => {
    const text =
      "Acetonitrile, in stock A: flammable vapour, harmful.\n\nWear gloves.\nRead the safety data sheet of each.";
    expect(writtenCautions(text)).toEqual([
      { concerns: "Acetonitrile, in stock A", text: "Flammable vapour, harmful." },
      { concerns: "", text: "Wear gloves." },
    ]);
  });

  it("lets what was written about a reagent stand in place of the usual caution", () => {
    const cautions = cautionsOf({
      species: [
        species("B", -2, { name: "hydroxide", formula: "OH-" }),
        species("X", -1, { formula: "H2O2" }),
      ],
      hazards: "Potassium hydroxide, B: strong alkali.",
    });
    expect(cautions.map(({ concerns }) => concerns)).toEqual(["H2O2, X", "Potassium hydroxide, B"]);
  });
});
