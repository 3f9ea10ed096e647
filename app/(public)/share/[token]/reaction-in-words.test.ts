import { describe, expect, test } from "vitest";
import { exampleSheet } from "@/tests/example-sheet";
import { reactionInWords } from "./reaction-in-words";

describe("the reaction on a shared page", () => {
  test("names both sides, the followed species and its stoichiometric number", () => {
    const sheet = exampleSheet();
    const doubled = sheet.species.map((one) => (one.id === "A" ? { ...one, stoichiometricNumber: -2 } : one));
    expect(reactionInWords({ ...sheet, species: doubled, followedSpeciesId: "A" })).toBe(
      "2 species A (A) + species B (B) → species P; species A is followed, ν = −2.",
    );
    expect(reactionInWords(sheet)).toContain("species P is followed, ν = +1.");
  });

  test("follows nothing where rates are entered by hand, and is empty without a reaction", () => {
    const sheet = exampleSheet();
    expect(reactionInWords({ ...sheet, signal: null })).toBe("species A (A) + species B (B) → species P.");
    expect(reactionInWords({ ...sheet, species: [] })).toBe("");
  });
});
