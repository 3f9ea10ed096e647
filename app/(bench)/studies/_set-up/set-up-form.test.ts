import { describe, expect, it } from "vitest";
import { parseReaction } from "@/app/_worksheet/reaction/parse-reaction";
import { speciesOfReaction } from "@/app/_worksheet/reaction/reaction-species";
import { sheet as sheetSchema } from "@/db/sheet/sheet.schema";
import { withSetUp } from "@/db/study/save-set-up";
import { exampleSheet } from "@/tests/example-sheet";
import { readSetUpForm } from "./read-set-up-form";
import { emptySetUpForm, setUpFormOf, speciesAfterReaction } from "./set-up-form";
import { type SetUpForm, type SpeciesForm, setUpForm } from "./set-up-form.schema";

const hydrolysis = "CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O";

function rowsFor(text: string, rows: readonly SpeciesForm[] = []): SpeciesForm[] {
  const reading = parseReaction(text);
  if (reading.status !== "read") throw new Error(JSON.stringify(reading));
  return speciesAfterReaction(rows, speciesOfReaction(reading.reaction));
}

function kept(rows: SpeciesForm[]): SpeciesForm[] {
  return rows.map((row, index) => ({ ...row, id: row.id || `s${index + 1}` }));
}

function form(changes: Partial<SetUpForm> = {}): SetUpForm {
  return {
    ...emptySetUpForm,
    name: "Hydrolysis",
    reaction: hydrolysis,
    species: rowsFor(hydrolysis),
    ...changes,
  };
}

function counter() {
  let next = 0;
  return () => {
    next += 1;
    return `s${next}`;
  };
}

describe("speciesAfterReaction", () => {
  it("puts reactants into the law and follows the product that was given a symbol", () => {
    const rows = rowsFor(hydrolysis);
    expect(rows.filter(({ inLaw }) => inLaw).map(({ symbol }) => symbol)).toEqual(["A", "B"]);
    expect(rows.filter(({ followed }) => followed).map(({ symbol }) => symbol)).toEqual(["P"]);
  });

  it("keeps rows of species that stay, with what was set by hand", () => {
    const first = kept(rowsFor(hydrolysis)).map(
      (row): SpeciesForm => (row.symbol === "A" ? { ...row, name: "the ester", unit: "umol/L" } : row),
    );
    const again = rowsFor(hydrolysis.replace("[B]", "[N]"), first);
    expect(again.map(({ id }) => id)).toEqual(first.map(({ id }) => id));
    expect(again[0]).toMatchObject({ name: "the ester", unit: "umol/L" });
    expect(again[1]).toMatchObject({ symbol: "N", id: "s2" });
  });

  it("knows a species by its symbol when its formula was corrected", () => {
    const again = rowsFor(hydrolysis.replace("CH3CO2C6H4NO2", "C8H7NO4"), kept(rowsFor(hydrolysis)));
    expect(again[0]).toMatchObject({ id: "s1", formula: "C8H7NO4" });
  });

  it("keeps what the reaction no longer names, out of the stoichiometry; a row that was never kept goes", () => {
    const shorter = "CH3CO2C6H4NO2 [A] + H2O -> NO2C6H4O- [P]";
    const hydroxide = rowsFor(shorter, kept(rowsFor(hydrolysis))).find(({ symbol }) => symbol === "B");
    expect(hydroxide).toMatchObject({ stoichiometricNumber: 0, role: "spectator", id: "s2", inLaw: true });
    expect(rowsFor(shorter, rowsFor(hydrolysis)).some(({ symbol }) => symbol === "B")).toBe(false);
  });
});

describe("readSetUpForm", () => {
  it("turns texts into the sheet's units", () => {
    const reading = readSetUpForm(
      form({
        temperature: "26,8 +- 0,1",
        ionicStrength: "0.100(1)",
        pathLength: "1.000 ± 0.002",
        wavelength: "400",
        activationEnergy: "61.5 ± 1.5",
        sampleInterval: "0,5",
        signal: { ...emptySetUpForm.signal, perMolar: "17930 ± 55", blank: "0.012 ± 0.002" },
      }),
      counter(),
    );
    if (reading.status !== "read") throw new Error(JSON.stringify(reading.faults));
    expect(reading.setUp.conditions).toMatchObject({
      temperatureKelvin: { value: 299.95, standardUncertainty: 0.1 },
      ionicStrengthMolar: { value: 0.1, standardUncertainty: 0.001 },
      pathLengthCentimetre: { value: 1, standardUncertainty: 0.002 },
      wavelengthNanometre: 400,
      activationEnergy: { value: 61_500, standardUncertainty: 1500 },
      sampleIntervalSeconds: 0.5,
    });
    expect(reading.setUp.signal).toEqual({
      kind: "calibrated",
      quantity: "Absorbance",
      unit: "",
      perMolar: { value: 17930, standardUncertainty: 55 },
      blank: { value: 0.012, standardUncertainty: 0.002 },
    });
    expect(reading.setUp.followedSpeciesId).toBe("s4");
  });

  it("gives back the boxes that it read, so that keeping without a change changes nothing", () => {
    const reading = readSetUpForm(
      form({
        activationEnergy: "61.5 ± 1.5",
        sampleInterval: "0.5",
        signal: { ...emptySetUpForm.signal, perMolar: "17930 ± 55", blank: "0.012 ± 0.002" },
      }),
      counter(),
    );
    if (reading.status !== "read") throw new Error(JSON.stringify(reading.faults));
    const { setUp } = reading;
    const sheet = withSetUp(exampleSheet(), setUp);
    expect(sheetSchema.parse(sheet)).toEqual(sheet);
    const again = readSetUpForm(setUpFormOf(sheet), counter());
    expect(again).toEqual(reading);
  });

  it.each<[Partial<SetUpForm>, string, string]>([
    [{ name: "  " }, "name", "needs a name"],
    [{ reaction: "Ch3 -> B" }, "reaction", "not the symbol of an element"],
    [{ temperature: "warm" }, "temperature", "is not read"],
    [{ temperature: "-300" }, "temperature", "absolute zero"],
    [{ ionicStrength: "-0.1" }, "ionicStrength", "not negative"],
    [{ activationEnergy: "60000" }, "activationEnergy", "write it in kJ mol^-1"],
    [{ activationEnergy: "-5" }, "activationEnergy", "not negative"],
    [{ sampleInterval: "0" }, "sampleInterval", "above 0 s"],
    [{ wavelength: "violet" }, "wavelength", "is not a number"],
    [{ signal: { ...emptySetUpForm.signal, perMolar: "0" } }, "signal.perMolar", "factor of 0"],
  ])("names the box of %o", (changes, path, message) => {
    const reading = readSetUpForm(form(changes), counter());
    if (reading.status !== "faults") throw new Error("was read");
    expect(reading.faults).toHaveLength(1);
    expect(reading.faults[0]).toMatchObject({ path });
    expect(reading.faults[0]?.message).toContain(message);
  });

  it("wants a symbol for each species of the law, once", () => {
    const species = rowsFor(hydrolysis).map((row) => (row.symbol === "B" ? { ...row, symbol: "A" } : row));
    const reading = readSetUpForm(form({ species }), counter());
    expect(reading).toMatchObject({ status: "faults", faults: [{ path: "species.1.symbol" }] });
  });
});

describe("the form as it comes from a page", () => {
  it("takes no species under a name that every object carries", () => {
    const named = (id: string) => form({ species: rowsFor(hydrolysis).map((row) => ({ ...row, id })) });
    for (const id of ["constructor", "__proto__", "toString"]) {
      expect(setUpForm.safeParse(named(id)).success).toBe(false);
    }
    expect(setUpForm.safeParse(named("s1")).success).toBe(true);
  });
});
