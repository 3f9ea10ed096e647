import { uniformFloat64 } from "pure-rand/distribution/uniformFloat64";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { SHEET_VERSION, type Sheet, sheet as sheetSchema } from "../sheet/sheet.schema";
import { inOrder } from "../sheet/sheet-rows";

/**
 * A sheet with every field drawn from what the schema allows, odd values among them: numbers of any size, empty
 * text, text of other scripts, rows in the bin, concentrations of species that are gone.
 */
export function randomSheet(seed: number): Sheet {
  const { any, chance, integer, number, positive, text, hash } = draws(seed);
  const uncertain = (value: number) => ({ value, standardUncertainty: positive() });
  const maybe = <T>(make: () => T): T | null => (chance(0.3) ? null : make());
  const times = <T>(most: number, make: (index: number) => T): T[] =>
    Array.from({ length: integer(most) }, (_, index) => make(index));
  const moment = () => new Date(1.7e12 + integer(1e11)).toISOString();

  const species = times(6, (index) => ({
    id: `s${index}`,
    symbol: chance(0.5) ? "" : text(4),
    name: text(40),
    formula: text(20),
    stoichiometricNumber: integer(7) - 3 + (chance(0.2) ? 0.5 : 0),
    charge: integer(5) - 2,
    role: any(["reactant", "product", "catalyst", "inhibitor", "spectator", "solvent"] as const),
    inLaw: chance(0.5),
    unit: any(["mol/L", "mmol/L", "umol/L"] as const),
    position: integer(4),
  }));
  const sheet: Sheet = {
    version: SHEET_VERSION,
    study: {
      name: `${text(30)}.`,
      invented: chance(0.5),
      reaction: text(80),
      timeUnit: any(["s", "min", "h"] as const),
      hazards: text(200),
    },
    species,
    followedSpeciesId: maybe(() => `s${integer(9)}`),
    conditions: {
      temperatureKelvin: maybe(() => uncertain(number())),
      ionicStrengthMolar: maybe(() => uncertain(number())),
      pathLengthCentimetre: maybe(() => uncertain(number())),
      wavelengthNanometre: maybe(positive),
      solvent: text(60),
      electrolyte: text(20),
    },
    signal: maybe(() =>
      chance(0.5)
        ? { kind: "concentration", unit: any(["mol/L", "mmol/L", "umol/L"] as const) }
        : { kind: "calibrated", quantity: `${text(20)}q`, unit: text(5), perMolar: uncertain(number()) },
    ),
    orders: Object.fromEntries(
      species.filter(() => chance(0.5)).map(({ id }) => [id, maybe(() => integer(10) - 4 + 0.5)]),
    ),
    runs: times(12, (index) => ({
      id: `r${index}`,
      label: `${text(6)}${index}`,
      position: integer(5),
      concentrations: Object.fromEntries(
        times(4, (of) => [`s${of}`, { molar: positive(), relativeUncertainty: number() ** 2 % 1 }]),
      ),
      temperatureKelvin: maybe(positive),
      block: maybe(() => text(10)),
      mixture: maybe(() => text(10)),
      trace: maybe(() => ({
        sha256: hash(),
        points: 1 + integer(1e6),
        uploadId: maybe(() => `u${integer(9)}`),
        column: text(20),
      })),
      enteredRate: maybe(() => ({ molarPerSecond: number(), standardError: maybe(positive) })),
      timeZeroSeconds: number(),
      window: maybe(() => ({ fromSeconds: number(), toSeconds: number() })),
      setAside: maybe(() => ({ reason: `${text(40)}!`, memberId: `m${integer(9)}`, at: moment() })),
      remark: text(60),
      changedIn: integer(1000),
      removedIn: maybe(() => 1 + integer(1000)),
    })),
    uploads: times(4, (index) => ({
      id: `u${index}`,
      sha256: hash(),
      fileName: text(30),
      size: integer(5e7),
      at: moment(),
      memberId: `m${integer(9)}`,
      reading: text(100),
    })),
  };
  return inOrder(sheetSchema.parse(sheet));
}

/** Seeded draws, each from a wide range. */
function draws(seed: number) {
  const generator = xoroshiro128plus(seed);
  const unit = () => uniformFloat64(generator);
  const integer = (below: number) => Math.floor(unit() * below);
  const any = <T>(values: readonly [T, ...T[]]): T => values[integer(values.length)] ?? values[0];
  const positive = (): number => {
    const value = unit() * 10 ** (integer(30) - 15);
    return value > 0 ? value : 1;
  };
  const alphabet = [..."abc XYZ0129.,;:'\"%_\\/\n\t±µ₁⁻⇌жλ漢😀\u0000\u202f"];
  return {
    any,
    integer,
    positive,
    chance: (probability: number) => unit() < probability,
    number: () => (unit() < 0.5 ? -1 : 1) * (unit() < 0.1 ? integer(1e6) : positive()),
    text: (most: number) =>
      Array.from({ length: integer(most / 2) }, () => alphabet[integer(alphabet.length)]).join(""),
    hash: () => Array.from({ length: 64 }, () => integer(16).toString(16)).join(""),
  };
}
