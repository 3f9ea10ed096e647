import { describe, expect, it } from "vitest";
import { parseReaction } from "./parse-reaction";
import { speciesOfReaction } from "./reaction-species";

function speciesOf(text: string) {
  const reading = parseReaction(text);
  if (reading.status !== "read") throw new Error(JSON.stringify(reading));
  return speciesOfReaction(reading.reaction);
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
