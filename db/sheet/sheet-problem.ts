import {
  isMeasurable,
  limitSentences,
  POINTS_PER_STUDY,
  RUNS_PER_STUDY,
  SCANS_PER_STUDY,
  SPECIES_PER_STUDY,
  STANDARDS_PER_STUDY,
  STOCKS_PER_STUDY,
} from "../limits";
import type { Sheet } from "./sheet.schema";
import type { SheetRows } from "./sheet-rows";

/**
 * What stands against keeping this sheet, as a sentence with the way out; undefined where nothing does. The schema
 * says what a sheet can be, this says what its rows must be to each other.
 */
export function sheetProblem(sheet: Sheet): string | undefined {
  return (
    speciesProblem(sheet) ??
    stockProblem(sheet) ??
    standardProblem(sheet) ??
    runProblem(sheet) ??
    numberProblem(sheet)
  );
}

/** The same for numbers of rows, which the schema would only throw at. The bin counts: its runs are kept. */
export function rowCountProblem(rows: SheetRows): string | undefined {
  const count = (section: string) => [...rows.keys()].filter((key) => key.startsWith(`${section}/`)).length;
  if (count("runs") > RUNS_PER_STUDY) return limitSentences.runs(count("runs"));
  if (count("uploads") > RUNS_PER_STUDY) return limitSentences.files(count("uploads"));
  if (count("species") > SPECIES_PER_STUDY) return limitSentences.species(count("species"));
  if (count("stocks") > STOCKS_PER_STUDY) return limitSentences.stocks(count("stocks"));
  if (count("standards") > STANDARDS_PER_STUDY) return limitSentences.standards(count("standards"));
  if (count("scans") > SCANS_PER_STUDY) return limitSentences.scans(count("scans"));
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

function stockProblem({ stocks, runs }: Sheet): string | undefined {
  const names = new Set<string>();
  const known = new Map(stocks.map((stock) => [stock.id, stock]));
  for (const stock of stocks) {
    const head = stock.symbol || stock.name;
    if (names.has(head)) return `Two stocks are called ${head}. Give one of them another symbol or name.`;
    names.add(head);
    if (stock.dilution !== null) {
      const { fromStockId, takenMicrolitre, markMicrolitre } = stock.dilution;
      if (!known.has(fromStockId))
        return `Stock ${head} is diluted from a stock that is not on the list. Choose what it was made from.`;
      if (takenMicrolitre.value > markMicrolitre.value)
        return `Stock ${head} takes more than its mark holds. Correct the volume taken or the mark.`;
      if (isItsOwnSource(stock.id, known))
        return `Stock ${head} is diluted from itself. Choose another stock that it was made from.`;
    }
  }
  for (const run of runs) {
    if (run.removedIn === null && Object.keys(run.volumes).some((id) => !known.has(id)))
      return `${run.label} takes a volume of a stock that is no longer on the list. Empty that volume, or keep the stock.`;
  }
  return undefined;
}

function isItsOwnSource(id: string, known: ReadonlyMap<string, Sheet["stocks"][number]>): boolean {
  const passed = new Set<string>();
  for (let at = known.get(id); at?.dilution; at = known.get(at.dilution.fromStockId)) {
    if (passed.has(at.id)) return true;
    passed.add(at.id);
  }
  return false;
}

function standardProblem({ standards, calibration }: Sheet): string | undefined {
  const labels = new Set<string>();
  for (const standard of standards) {
    if (labels.has(standard.label))
      return `Two standards have the label ${standard.label}. Give one of them another.`;
    labels.add(standard.label);
  }
  const range = calibration.rangeMolar;
  return range !== null && !(range.low < range.high)
    ? "The linear range ends before it begins. Set its end above its start."
    : undefined;
}

function runProblem({ runs }: Sheet): string | undefined {
  const labels = new Set<string>();
  let points = 0;
  for (const run of runs) {
    points += run.trace?.points ?? 0;
    if (run.window !== null && !(run.window.fromSeconds < run.window.toSeconds)) {
      return `The window of ${run.label} ends before it begins. Set its end after its start.`;
    }
    if (run.trim !== null && !(run.trim.fromSeconds < run.trim.toSeconds)) {
      return `The part of ${run.label} that counts ends before it begins. Set its end after its start.`;
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

function* measuredNumbers({
  conditions,
  signal,
  species,
  stocks,
  standards,
  runs,
}: Sheet): Generator<MeasuredNumber> {
  yield* uncertainNumbers("The temperature in K", conditions.temperatureKelvin);
  yield* uncertainNumbers("The ionic strength in mol/L", conditions.ionicStrengthMolar);
  yield* uncertainNumbers("The path length in cm", conditions.pathLengthCentimetre);
  if (conditions.wavelengthNanometre !== null)
    yield { what: "The wavelength in nm", value: conditions.wavelengthNanometre };
  yield* uncertainNumbers("The activation energy in J/mol", conditions.activationEnergy);
  if (signal?.kind === "calibrated") {
    yield* uncertainNumbers("The signal per mol/L", signal.perMolar);
    yield* uncertainNumbers("The signal of the blank", signal.blank);
  }
  for (const stock of stocks) {
    for (const content of Object.values(stock.contents))
      yield* uncertainNumbers(`A concentration in stock ${stock.symbol || stock.name}, in mol/L,`, content);
    yield* uncertainNumbers(
      `The volume taken for stock ${stock.symbol || stock.name} in µL`,
      stock.dilution?.takenMicrolitre ?? null,
    );
    yield* uncertainNumbers(
      `The mark of stock ${stock.symbol || stock.name} in µL`,
      stock.dilution?.markMicrolitre ?? null,
    );
  }
  for (const standard of standards) {
    yield* uncertainNumbers(
      `The concentration of standard ${standard.label} in mol/L`,
      standard.concentration,
    );
    for (const value of standard.signals) yield { what: `A reading of standard ${standard.label}`, value };
  }
  const symbols = new Map(species.map((one) => [one.id, one.symbol]));
  for (const run of runs) {
    for (const [id, { molar }] of Object.entries(run.concentrations))
      yield {
        what: `The concentration of ${symbols.get(id) ?? "a species"} in ${run.label}, in mol/L,`,
        value: molar,
      };
    for (const value of Object.values(run.volumes)) yield { what: `A volume of ${run.label} in µL`, value };
    yield { what: `The mark of ${run.label} in µL`, value: run.markMicrolitre ?? 0 };
    yield { what: `The time zero of ${run.label} in s`, value: run.timeZeroSeconds };
    yield { what: `The dead time of ${run.label} in s`, value: run.deadTimeSeconds };
    yield* uncertainNumbers(`The end signal of ${run.label}`, run.endSignal);
    if (run.trim !== null) {
      yield { what: `The start of the part of ${run.label} that counts, in s,`, value: run.trim.fromSeconds };
      yield { what: `The end of the part of ${run.label} that counts, in s,`, value: run.trim.toSeconds };
    }
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
