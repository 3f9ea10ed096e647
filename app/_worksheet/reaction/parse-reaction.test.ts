import { describe, expect, it } from "vitest";
import { balanceOf } from "./balance";
import { parseFormula } from "./formula";
import { LONGEST_REACTION, parseReaction, type Reaction, type ReactionTerm } from "./parse-reaction";

function read(text: string): Reaction {
  const reading = parseReaction(text);
  if (reading.status !== "read") throw new Error(`${text}: ${JSON.stringify(reading)}`);
  return reading.reaction;
}

function side(terms: readonly ReactionTerm[]): string {
  return terms
    .map(({ coefficient, species, symbol }) => `${coefficient} ${species.text}${symbol && `[${symbol}]`}`)
    .join(" + ");
}

function refusal(text: string) {
  const reading = parseReaction(text);
  if (reading.status !== "unreadable") throw new Error(`${text} was read`);
  return { at: text.slice(reading.position, reading.position + reading.length), message: reading.message };
}

// Textbook equations whose balance is known by count; each must balance in atoms and charge.
const balanced: readonly (readonly [typed: string, left: string, right: string, charge: number])[] = [
  [
    "CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O",
    "1 CH3CO2C6H4NO2[A] + 2 OH-[B]",
    "1 CH3CO2- + 1 NO2C6H4O-[P] + 1 H2O",
    -2,
  ],
  ["S2O82- + 2 I- → 2 SO42- + I2", "1 S2O8^2- + 2 I-", "2 SO4^2- + 1 I2", -4],
  ["S2O8^2- [S] + 3 I- [I] -> 2 SO4^2- + I3-", "1 S2O8^2-[S] + 3 I-[I]", "2 SO4^2- + 1 I3-", -5],
  [
    "MnO4- + 5 Fe2+ + 8 H+ -> Mn2+ + 5 Fe3+ + 4 H2O",
    "1 MnO4- + 5 Fe^2+ + 8 H+",
    "1 Mn^2+ + 5 Fe^3+ + 4 H2O",
    17,
  ],
  ["Cr2O72- + 14 H+ + 6 e- -> 2 Cr3+ + 7 H2O", "1 Cr2O7^2- + 14 H+ + 6 e-", "2 Cr^3+ + 7 H2O", 6],
  ["CuSO4·5H2O -> CuSO4 + 5 H2O", "1 CuSO4·5H2O", "1 CuSO4 + 5 H2O", 0],
  ["Fe(CN)63- + e- -> Fe(CN)64-", "1 Fe(CN)6^3- + 1 e-", "1 Fe(CN)6^4-", -4],
  [
    "[Co(NH3)5Cl]2+ [C] + H2O -> [Co(NH3)5(H2O)]3+ + Cl-",
    "1 [Co(NH3)5Cl]^2+[C] + 1 H2O",
    "1 [Co(NH3)5(H2O)]^3+ + 1 Cl-",
    2,
  ],
  ["CaCO3(s) + 2 H+(aq) -> Ca2+(aq) + H2O(l) + CO2(g)", "1 CaCO3 + 2 H+", "1 Ca^2+ + 1 H2O + 1 CO2", 2],
  ["CH3COCH3 + I2 + H+ -> CH3COCH2I + I- + 2 H+", "1 CH3COCH3 + 1 I2 + 1 H+", "1 CH3COCH2I + 1 I- + 2 H+", 1],
  ["HCO₃⁻ + H⁺ ⇌ H₂CO₃", "1 HCO3- + 1 H+", "1 H2CO3", 0],
  ["SO4 2- + Ba 2+ => BaSO4", "1 SO4^2- + 1 Ba^2+", "1 BaSO4", 0],
  ["2H2O2=>2H2O+O2", "2 H2O2", "2 H2O + 1 O2", 0],
  ["N2O5 -> 2 NO2 + 1/2 O2", "1 N2O5", "2 NO2 + 0.5 O2", 0],
  ["NH4+ + NO2- -> N2 + 2 H2O", "1 NH4+ + 1 NO2-", "1 N2 + 2 H2O", 0],
  ["C12H22O11 [S] + H2O -> C6H12O6 + C6H12O6", "1 C12H22O11[S] + 1 H2O", "1 C6H12O6 + 1 C6H12O6", 0],
  ["CH3• + O2 → CH3O2•", "1 CH3• + 1 O2", "1 CH3O2•", 0],
  ["Fe^3+ + SCN^- <=> FeSCN^2+", "1 Fe^3+ + 1 SCN-", "1 FeSCN^2+", 2],
];

describe("parseReaction", () => {
  it.each(balanced)("reads and balances %s", (typed, left, right, charge) => {
    const reaction = read(typed);
    expect(side(reaction.left)).toBe(left);
    expect(side(reaction.right)).toBe(right);
    const balance = balanceOf(reaction);
    expect(balance.atoms.status).toBe("balances");
    expect(balance.charge).toEqual({ status: "balances", charge });
  });

  it("tells an equilibrium from a reaction that goes one way", () => {
    expect(read("A ⇌ D").arrow).toBe("equilibrium");
    expect(read("A -> D").arrow).toBe("forward");
  });

  it("counts atoms in Hill order", () => {
    const { atoms } = balanceOf(read("CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O"));
    expect(atoms).toEqual({
      status: "balances",
      counts: [
        { element: "C", count: 8 },
        { element: "H", count: 9 },
        { element: "N", count: 1 },
        { element: "O", count: 6 },
      ],
    });
  });

  it("names the element and the charge that do not balance", () => {
    const balance = balanceOf(read("MnO4- + Fe2+ -> Mn2+ + Fe3+"));
    expect(balance.atoms).toEqual({ status: "differs", differences: [{ element: "O", left: 4, right: 0 }] });
    expect(balance.charge).toEqual({ status: "differs", left: 1, right: 5 });
  });

  it("takes names, with quotes where they begin with a digit, and does not balance them", () => {
    const reaction = read('"4-nitrophenyl acetate" [A] + OH- -> methyl orange [M]');
    expect(side(reaction.left)).toBe("1 4-nitrophenyl acetate[A] + 1 OH-");
    expect(side(reaction.right)).toBe("1 methyl orange[M]");
    expect(balanceOf(reaction).atoms).toEqual({
      status: "not-checked",
      names: ["4-nitrophenyl acetate", "methyl orange"],
    });
  });

  it("takes single capitals for names and not for boron or phosphorus", () => {
    expect(read("A + 2 B -> P").left.map(({ species }) => species.kind)).toEqual(["name", "name"]);
  });

  it.each([
    ["H2O", "", "An arrow is missing"],
    ["A -> B -> C", "->", "the second"],
    ["-> H2O", " ", "before the arrow"],
    ["H2O -> ", " ", "after the arrow"],
    ["H2O + + H2 -> O2", " ", "missing beside this plus"],
    ["Ch3 + O2 -> CO2", "Ch", "not the symbol of an element"],
    ["H2O + 0 H2 -> O2", "0", "above 0"],
    ["H2O + 100 H2 -> O2", "100", "at most 99"],
    ["4-nitrophenol -> H2O", "4-nitrophenol", "stands in quotes"],
    ['"dye -> H2O', '"', "not closed"],
    ["Fe(CN6 -> H2O", "(", "not closed"],
    ["(((((((H))))))) -> H", "(", "nested more than 6"],
    ["H99999999 -> H2O", "99999999", "count from 1 to 9999"],
    ["H2O [A] + D2O [A] -> HDO", "D2O [A]", "cannot both be [A]"],
    ["H2O [] -> H2", "[]", "1 to 12 characters"],
    ["C² -> C", "\u00b2", "needs its sign"],
  ])("refuses %s at its place", (typed, place, message) => {
    const refused = refusal(typed);
    expect(refused.message).toContain(message);
    if (place.trim() !== "") expect(refused.at).toContain(place);
  });

  it("calls blank text empty, and refuses more than a reaction's length or species", () => {
    expect(parseReaction("  ").status).toBe("empty");
    expect(refusal(`${"H".repeat(LONGEST_REACTION)} -> H`).message).toContain("400 characters");
    expect(refusal(`${Array.from({ length: 25 }, () => "H").join("+")}->H`).message).toContain("24 species");
  });

  it("takes words that are keys of objects for names only", () => {
    const reaction = read("__proto__ + constructor -> toString");
    expect(side(reaction.left)).toBe("1 __proto__ + 1 constructor");
    expect(balanceOf(reaction).charge.status).toBe("not-checked");
  });

  it("answers hostile text quickly and without throwing", () => {
    const hostile = [
      "(".repeat(400),
      "+".repeat(400),
      "[".repeat(200) + "]".repeat(200),
      "->".repeat(200),
      '"'.repeat(399),
    ];
    hostile.push(
      `${"1".repeat(398)}->`,
      `${"-".repeat(398)}->`,
      "H+".repeat(200),
      "\u0000\uE000\uFFFF -> 💥",
      "^".repeat(400),
    );
    const started = performance.now();
    for (const text of hostile) expect(parseReaction(text).status).toBe("unreadable");
    expect(performance.now() - started).toBeLessThan(500);
  });
});

describe("parseFormula", () => {
  it.each([
    ["Fe3+", "Fe^3+", 3],
    ["I3-", "I3-", -1],
    ["N3-", "N3-", -1],
    ["S2-", "S^2-", -2],
    ["Hg22+", "Hg2^2+", 2],
    ["C6H12+", "C6H12+", 1],
    ["PtCl62-", "PtCl6^2-", -2],
    ["FeSCN^2+", "FeSCN^2+", 2],
    ["Ca++", "Ca^2+", 2],
    ["SO4^-2", "SO4^2-", -2],
    ["[Fe(CN)6]4-", "[Fe(CN)6]^4-", -4],
    ["H3O+", "H3O+", 1],
    ["S^-", "S-", -1],
  ])("reads the charge of %s", (typed, text, charge) => {
    const reading = parseFormula(typed);
    expect(reading).toMatchObject({ status: "read", formula: { text, charge } });
    // What is kept must read back as itself.
    expect(parseFormula(text)).toEqual(reading);
  });

  it("counts atoms through brackets and hydrates", () => {
    const reading = parseFormula("K4[Fe(CN)6]·3H2O");
    if (reading.status !== "read") throw new Error(reading.message);
    expect(Object.fromEntries(reading.formula.atoms)).toEqual({ K: 4, Fe: 1, C: 6, N: 6, H: 6, O: 3 });
  });
});
