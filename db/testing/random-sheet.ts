import { uniformFloat64 } from "pure-rand/distribution/uniformFloat64";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";
import { SHEET_VERSION, type Sheet, sheet as sheetSchema } from "../sheet/sheet.schema";
import { inOrder } from "../sheet/sheet-rows";

/**
 * A sheet with every field drawn from what the schema allows, odd values among them: numbers of any size, empty
 * text, text of other scripts, rows in the bin, concentrations of species that are gone.
 */
export function randomSheet(seed: number): Sheet {
  const { chance, hash, integer, number, oneOf, positive, text } = draws(seed);
  const uncertain = (value: number) => ({ value, standardUncertainty: positive() });
  const maybe = <T>(make: () => T): T | null => (chance(0.3) ? null : make());
  const times = <T>(most: number, make: (index: number) => T): T[] =>
    Array.from({ length: integer(most) }, (_, index) => make(index));
  const moment = () => new Date(1.7e12 + integer(1e11)).toISOString();

  const setAside = () => ({ reason: `${text(40)}!`, memberId: `m${integer(9)}`, at: moment() });
  const points = () => ({
    sha256: hash(),
    points: 1 + integer(1e6),
    uploadId: maybe(() => `u${integer(9)}`),
    column: text(20),
  });

  const species = times(6, (index) => ({
    id: `s${index}`,
    symbol: chance(0.5) ? "" : text(4),
    name: text(40),
    formula: text(20),
    stoichiometricNumber: integer(7) - 3 + (chance(0.2) ? 0.5 : 0),
    charge: integer(5) - 2,
    role: oneOf(["reactant", "product", "catalyst", "inhibitor", "spectator", "solvent"] as const),
    inLaw: chance(0.5),
    unit: oneOf(["mol/L", "mmol/L", "umol/L"] as const),
    position: integer(4),
  }));
  const sheet: Sheet = {
    version: SHEET_VERSION,
    study: {
      name: `${text(30)}.`,
      invented: chance(0.5),
      reaction: text(80),
      timeUnit: oneOf(["s", "min", "h"] as const),
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
      activationEnergy: maybe(() => uncertain(number())),
      referenceIonicStrengthMolar: maybe(positive),
      sampleIntervalSeconds: maybe(positive),
    },
    signal: maybe(() =>
      chance(0.5)
        ? { kind: "concentration", unit: oneOf(["mol/L", "mmol/L", "umol/L"] as const) }
        : {
            kind: "calibrated",
            quantity: `${text(20)}q`,
            unit: text(5),
            perMolar: uncertain(number()),
            blank: maybe(() => uncertain(number())),
            source: oneOf(["typed", "standards"] as const),
          },
    ),
    orders: Object.fromEntries(
      species.filter(() => chance(0.5)).map(({ id }) => [id, maybe(() => integer(10) - 4 + 0.5)]),
    ),
    stocks: times(5, (index) => ({
      id: `k${index}`,
      symbol: text(4),
      name: `${text(30)}k`,
      position: integer(4),
      contents: Object.fromEntries(times(3, (of) => [`s${of}`, uncertain(positive())])),
      dilution: maybe(() => ({
        fromStockId: `k${integer(9)}`,
        takenMicrolitre: uncertain(positive()),
        markMicrolitre: uncertain(positive()),
      })),
      lot: text(20),
      madeOn: text(10),
      howKnown: text(40),
    })),
    mixing: {
      volumeUnit: oneOf(["uL", "mL"] as const),
      markMicrolitre: maybe(positive),
      deliveries: times(3, () => ({
        upToMicrolitre: maybe(positive),
        absoluteMicrolitre: positive(),
        relative: number() ** 2 % 1,
      })),
    },
    standards: times(6, (index) => ({
      id: `d${index}`,
      label: `${text(6)}${index}`,
      position: integer(5),
      concentration: uncertain(positive()),
      signals: times(5, number),
      isBlank: chance(0.2),
      setAside: maybe(setAside),
      remark: text(30),
    })),
    calibration: {
      speciesId: maybe(() => `s${integer(9)}`),
      intercept: oneOf(["fitted", "none"] as const),
      weighting: oneOf(["none", "proportional"] as const),
      rangeMolar: maybe(() => ({ low: positive(), high: positive() })),
      stockRelative: number() ** 2 % 1,
    },
    scans: times(3, (index) => ({
      id: `c${index}`,
      label: `${text(6)}${index}`,
      position: integer(3),
      speciesId: maybe(() => `s${integer(9)}`),
      molar: maybe(positive),
      points: points(),
    })),
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
      volumes: Object.fromEntries(times(4, (of) => [`k${of}`, positive()])),
      markMicrolitre: maybe(positive),
      trace: maybe(points),
      enteredRate: maybe(() => ({ molarPerSecond: number(), standardError: maybe(positive) })),
      timeZeroSeconds: number(),
      deadTimeSeconds: positive(),
      trim: maybe(() => ({ fromSeconds: number(), toSeconds: number() })),
      spikes: times(5, (of) => of * 7 + integer(7)),
      endSignal: maybe(() => uncertain(number())),
      window: maybe(() => ({ fromSeconds: number(), toSeconds: number() })),
      setAside: maybe(setAside),
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
  const oneOf = <T>(values: readonly [T, ...T[]]): T => values[integer(values.length)] ?? values[0];
  const positive = (): number => {
    const value = unit() * 10 ** (integer(30) - 15);
    return value > 0 ? value : 1;
  };
  const alphabet = [..."abc XYZ0129.,;:'\"%_\\/\n\t±µ₁⁻⇌жλ漢😀\u0000\u202f"];
  return {
    oneOf,
    integer,
    positive,
    chance: (probability: number) => unit() < probability,
    number: () => (unit() < 0.5 ? -1 : 1) * (unit() < 0.1 ? integer(1e6) : positive()),
    text: (most: number) =>
      Array.from({ length: integer(most / 2) }, () => alphabet[integer(alphabet.length)]).join(""),
    hash: () => Array.from({ length: 64 }, () => integer(16).toString(16)).join(""),
  };
}
