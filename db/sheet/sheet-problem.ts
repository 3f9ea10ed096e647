import { isMeasurable, limitSentences, POINTS_PER_STUDY, RUNS_PER_STUDY, SPECIES_PER_STUDY } from "../limits";
import type { Sheet } from "./sheet.schema";
import type { SheetRows } from "./sheet-rows";

/**
 * What stands against keeping this sheet, as a sentence with the way out; undefined where nothing does. The schema
 * says what a sheet can be, this says what its rows must be to each other.
 */
export function sheetProblem(sheet: Sheet): string | undefined {
  return speciesProblem(sheet) ?? runProblem(sheet) ?? numberProblem(sheet);
}

/** The same for numbers of rows, which the schema would only throw at. The bin counts: its runs are kept. */
export function rowCountProblem(rows: SheetRows): string | undefined {
  const count = (section: string) => [...rows.keys()].filter((key) => key.startsWith(`${section}/`)).length;
  if (count("runs") > RUNS_PER_STUDY) return limitSentences.runs(count("runs"));
  if (count("uploads") > RUNS_PER_STUDY) return limitSentences.files(count("uploads"));
  if (count("species") > SPECIES_PER_STUDY) return limitSentences.species(count("species"));
  return undefined;
}

function speciesProblem({ species, followedSpeciesId }: Sheet): string | undefined {
  const symbols = new Set<string>();
  for (const one of species) {
    if (one.symbol === "") {
      if (one.inLaw) return `${one.name || one.formula} stands in the law and needs a symbol, such as A.`;
      continue;
    }
    if (symbols.has(one.symbol)) {
      return `Two species have the symbol ${one.symbol}. Give one of them another.`;
    }
    symbols.add(one.symbol);
  }
  if (followedSpeciesId === null) return undefined;
  const followed = species.find((one) => one.id === followedSpeciesId);
  if (followed === undefined) {
    return "The species that is followed is no longer among the species. Choose which one is followed.";
  }
  if (followed.stoichiometricNumber === 0) {
    return `${followed.symbol || followed.name} is followed and has the stoichiometric number 0: its signal would not change. Follow a species that reacts, or correct its number.`;
  }
  return undefined;
}

function runProblem({ runs }: Sheet): string | undefined {
  const labels = new Set<string>();
  let points = 0;
  for (const run of runs) {
    points += run.trace?.points ?? 0;
    if (run.window !== null && !(run.window.fromSeconds < run.window.toSeconds)) {
      return `The window of ${run.label} ends before it begins. Set its end after its start.`;
    }
    if (run.removedIn !== null) continue;
    if (labels.has(run.label)) {
      return `Two runs have the label ${run.label}. Give one of them another.`;
    }
    labels.add(run.label);
  }
  if (points > POINTS_PER_STUDY) return limitSentences.points(points);
  return undefined;
}

/** A number that overflows on its way through the analysis would leave every page of the study without one. */
function numberProblem(sheet: Sheet): string | undefined {
  for (const { what, value } of measuredNumbers(sheet)) {
    if (!isMeasurable(value)) return limitSentences.measured(what, value);
  }
  return undefined;
}

interface MeasuredNumber {
  readonly what: string;
  readonly value: number;
}

function* measuredNumbers({ conditions, signal, species, runs }: Sheet): Generator<MeasuredNumber> {
  yield* uncertainNumbers("The temperature in K", conditions.temperatureKelvin);
  yield* uncertainNumbers("The ionic strength in mol/L", conditions.ionicStrengthMolar);
  yield* uncertainNumbers("The path length in cm", conditions.pathLengthCentimetre);
  if (conditions.wavelengthNanometre !== null)
    yield { what: "The wavelength in nm", value: conditions.wavelengthNanometre };
  if (signal?.kind === "calibrated") yield* uncertainNumbers("The signal per mol/L", signal.perMolar);
  const symbols = new Map(species.map((one) => [one.id, one.symbol]));
  for (const run of runs) {
    for (const [id, { molar }] of Object.entries(run.concentrations))
      yield {
        what: `The concentration of ${symbols.get(id) ?? "a species"} in ${run.label}, in mol/L,`,
        value: molar,
      };
    yield { what: `The time zero of ${run.label} in s`, value: run.timeZeroSeconds };
    if (run.temperatureKelvin !== null)
      yield { what: `The temperature of ${run.label} in K`, value: run.temperatureKelvin };
    if (run.enteredRate !== null) {
      const { molarPerSecond, standardError } = run.enteredRate;
      yield { what: `The rate of ${run.label} in mol/L/s`, value: molarPerSecond };
      yield { what: `The standard error of the rate of ${run.label} in mol/L/s`, value: standardError ?? 0 };
    }
    if (run.window !== null) {
      yield { what: `The start of the window of ${run.label} in s`, value: run.window.fromSeconds };
      yield { what: `The end of the window of ${run.label} in s`, value: run.window.toSeconds };
    }
  }
}

function* uncertainNumbers(
  what: string,
  quantity: { readonly value: number; readonly standardUncertainty: number } | null,
): Generator<MeasuredNumber> {
  if (quantity === null) return;
  yield { what, value: quantity.value };
  yield { what: `${what} has an uncertainty that`, value: quantity.standardUncertainty };
}
