import { describe, expect, it } from "vitest";
import type { SheetSpecies } from "@/db/sheet/sheet.schema";
import { parseReaction } from "./parse-reaction";
import { mergeSpecies, speciesOfReaction } from "./reaction-species";

function speciesOf(text: string) {
  const reading = parseReaction(text);
  if (reading.status !== "read") throw new Error(JSON.stringify(reading));
  return speciesOfReaction(reading.reaction);
}

function counter() {
  let next = 0;
  return () => {
    next += 1;
    return `s${next}`;
  };
}

const hydrolysis = "CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O";

describe("speciesOfReaction", () => {
  it("gives signed stoichiometric numbers, charges and roles", () => {
    expect(
      speciesOf(hydrolysis).map(({ symbol, name, stoichiometricNumber, charge, role }) => [
        symbol,
        name,
        stoichiometricNumber,
        charge,
        role,
      ]),
    ).toEqual([
      ["A", "", -1, 0, "reactant"],
      ["B", "hydroxide", -2, -1, "reactant"],
      ["", "acetate", 1, -1, "product"],
      ["P", "", 1, -1, "product"],
      ["", "water", 1, 0, "solvent"],
    ]);
  });

  it("takes what is on both sides to the same amount for a catalyst, and nets other amounts", () => {
    const [, , acid] = speciesOf("CH3COCH3 + I2 + H+ -> CH3COCH2I + I- + 2 H+");
    expect(acid).toMatchObject({ stoichiometricNumber: 1, role: "product", symbol: "" });
    const catalyst = speciesOf("dye + H2O2 + cat -> bleached + H2O + cat").find(({ key }) => key === "cat");
    expect(catalyst).toMatchObject({ stoichiometricNumber: 0, role: "catalyst", symbol: "cat" });
  });

  it("gives reactants without a symbol one that is free", () => {
    expect(speciesOf("CH3CO2C6H4NO2 + OH- [A] -> CH3CO2H").map(({ symbol }) => symbol)).toEqual([
      "B",
      "A",
      "",
    ]);
  });
});

describe("mergeSpecies", () => {
  const first = mergeSpecies([], speciesOf(hydrolysis), counter());

  it("puts reactants into the law and nothing else", () => {
    expect(first.filter(({ inLaw }) => inLaw).map(({ symbol }) => symbol)).toEqual(["A", "B"]);
  });

  it("keeps the rows of species that stay, with what was set by hand", () => {
    const named = first.map(
      (row): SheetSpecies => (row.symbol === "A" ? { ...row, name: "the ester", unit: "umol/L" } : row),
    );
    const merged = mergeSpecies(named, speciesOf(hydrolysis.replace("2 OH- [B]", "2 OH- [N]")), () => "new");
    expect(merged.map(({ id }) => id)).toEqual(first.map(({ id }) => id));
    expect(merged[0]).toMatchObject({ name: "the ester", unit: "umol/L" });
    expect(merged[1]).toMatchObject({ symbol: "N", id: first[1]?.id });
  });

  it("knows a species by its symbol when its formula was corrected", () => {
    const merged = mergeSpecies(
      first,
      speciesOf(hydrolysis.replace("CH3CO2C6H4NO2", "C8H7NO4")),
      () => "new",
    );
    expect(merged[0]).toMatchObject({ id: first[0]?.id, formula: "C8H7NO4" });
  });

  it("keeps what the reaction no longer names, out of the stoichiometry", () => {
    const merged = mergeSpecies(first, speciesOf("CH3CO2C6H4NO2 [A] + H2O -> NO2C6H4O- [P]"), () => "new");
    const hydroxide = merged.find(({ symbol }) => symbol === "B");
    expect(hydroxide).toMatchObject({
      stoichiometricNumber: 0,
      role: "spectator",
      id: first[1]?.id,
      inLaw: true,
    });
  });
});
