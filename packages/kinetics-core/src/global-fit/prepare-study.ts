import type { CourseLaw, StudySpecies } from "./course-law";
import { equationCourse } from "./equation-course";
import { failure, type GlobalFitFailure, type GlobalFitInput, type GlobalFitRun } from "./global-fit";
import { powerCourse } from "./power-course";
import { type PreparedRun, type PreparedStudy, spacingOf } from "./prepared-study";

/** Reads a study into typed arrays, or says which argument keeps it from being fitted. */

/** A run with fewer readings has nothing left when its offset and its own ln k are taken out. */
const FEWEST_POINTS = 4;
/** Relative to the value: a scale that is known no better is not known, and its square must stay a number. */
const LARGEST_SCALE_UNCERTAINTY = 1e6;

export type Preparation =
  | { readonly status: "prepared"; readonly study: PreparedStudy }
  | { readonly status: "refused"; readonly failure: GlobalFitFailure };

export function prepareStudy(input: GlobalFitInput): Preparation {
  const fault = inputFault(input) ?? firstRunFault(input);
  if (fault !== null) return { status: "refused", failure: fault };
  const followed = input.species.findIndex(({ name }) => name === input.followed);
  const followedNumber = input.species[followed]?.stoichiometricNumber ?? 0;
  const { value, standardUncertainty } = input.signalPerConcentration;
  const study: PreparedStudy = {
    law: lawOf(input),
    runs: input.runs.map((run) => preparedRun(run, input.species, followed, followedNumber, value)),
    followedNumber,
    scale: value,
    scaleVariance: (standardUncertainty / value) ** 2,
    scaleDeviationVariance: (input.scaleDeviation ?? 0) ** 2,
    hasTimeZero: input.runs.some((run) => (run.timeZero?.standardUncertainty ?? 0) > 0),
  };
  return { status: "prepared", study };
}

function lawOf({ law, species }: GlobalFitInput): CourseLaw {
  return "orders" in law
    ? powerCourse(species, law.orders)
    : equationCourse(species, law.equation, law.held ?? {});
}

function inputFault(input: GlobalFitInput): GlobalFitFailure | null {
  const { species, followed, signalPerConcentration, runs, scaleDeviation = 0, level = 0.95 } = input;
  const names = species.map(({ name }) => name);
  const twice = names.findIndex((name, place) => names.indexOf(name) !== place);
  if (twice >= 0)
    return failure(
      "bad-input",
      `species.${twice}`,
      `${names[twice]} stands twice among the species; name each once.`,
    );
  const odd = species.findIndex(({ stoichiometricNumber }) => !Number.isFinite(stoichiometricNumber));
  if (odd >= 0)
    return failure(
      "bad-input",
      `species.${odd}.stoichiometricNumber`,
      `The stoichiometric number of ${names[odd]} is ${species[odd]?.stoichiometricNumber}; a finite number, negative for a reactant, is needed.`,
    );
  const at = species.find(({ name }) => name === followed);
  if (at === undefined || at.stoichiometricNumber === 0)
    return failure(
      "bad-input",
      "followed",
      `The followed species ${followed} ${at === undefined ? "is not among the species" : "has the stoichiometric number 0 and never changes"}; name one that is used up or formed.`,
    );
  const { value, standardUncertainty } = signalPerConcentration;
  if (!(Number.isFinite(value) && value !== 0))
    return failure(
      "bad-input",
      "signalPerConcentration.value",
      `The signal per concentration is ${value}; a finite number other than 0 is needed.`,
    );
  if (!(standardUncertainty >= 0 && Number.isFinite(standardUncertainty)))
    return failure(
      "bad-input",
      "signalPerConcentration.standardUncertainty",
      `The standard uncertainty of the signal per concentration is ${standardUncertainty}; a number from 0 on is needed, 0 if it is exact.`,
    );
  if (standardUncertainty > LARGEST_SCALE_UNCERTAINTY * Math.abs(value))
    return failure(
      "bad-input",
      "signalPerConcentration.standardUncertainty",
      `The signal per concentration is ${value} with a standard uncertainty of ${standardUncertainty}, more than a million times itself; look for a wrong power of ten.`,
    );
  if (!(scaleDeviation >= 0 && Number.isFinite(scaleDeviation)))
    return failure(
      "bad-input",
      "scaleDeviation",
      `The deviation of the runs' scales is ${scaleDeviation}; a number from 0 on is needed.`,
    );
  if (!(level > 0 && level < 1))
    return failure(
      "bad-input",
      "level",
      `The confidence level is ${level}; a number between 0 and 1 is needed.`,
    );
  if (runs.length === 0)
    return failure("too-few-points", "runs", "There is no run. Add at least one with its trace.");
  return lawFault(input, names);
}

function lawFault({ law }: GlobalFitInput, names: readonly string[]): GlobalFitFailure | null {
  if ("orders" in law) {
    const unknown = Object.keys(law.orders).find((name) => !names.includes(name));
    if (unknown !== undefined)
      return failure(
        "bad-input",
        `law.orders.${unknown}`,
        `${unknown} has an order but is not among the species (${names.join(", ")}).`,
      );
    const wrong = Object.entries(law.orders).find(([, order]) => order !== "free" && !Number.isFinite(order));
    if (wrong !== undefined)
      return failure(
        "bad-input",
        `law.orders.${wrong[0]}`,
        `The order of ${wrong[0]} is ${wrong[1]}; a finite number or "free" is needed.`,
      );
    return null;
  }
  const unknown = law.equation.species.find((name) => !names.includes(name));
  if (unknown !== undefined)
    return failure(
      "bad-input",
      "law.equation",
      `The rate law names ${unknown}, which is not among the species (${names.join(", ")}).`,
    );
  const parameters = law.equation.parameters.map(({ name }) => name);
  const held = Object.entries(law.held ?? {});
  const stray = held.find(([name, value]) => !parameters.includes(name) || !Number.isFinite(value));
  if (stray !== undefined)
    return failure(
      "bad-input",
      `law.held.${stray[0]}`,
      `${stray[0]} cannot be held at ${stray[1]}: the rate law has ${parameters.length === 0 ? "no parameter beside k" : parameters.join(", ")}, and a finite value is needed.`,
    );
  return null;
}

function firstRunFault(input: GlobalFitInput): GlobalFitFailure | null {
  const labels = new Set<string>();
  for (const [index, run] of input.runs.entries()) {
    if (labels.has(run.label))
      return failure(
        "bad-input",
        `runs.${index}.label`,
        `Two runs are labelled ${run.label}; give each a label of its own.`,
      );
    labels.add(run.label);
    const fault = runFault(run, `runs.${index}`, input.species);
    if (fault !== null) return fault;
  }
  return null;
}

function runFault(
  run: GlobalFitRun,
  path: string,
  species: readonly StudySpecies[],
): GlobalFitFailure | null {
  const { label, time, signal, concentrations, endSignal, timeZero } = run;
  if (time.length !== signal.length)
    return failure(
      "bad-input",
      `${path}.signal`,
      `Run ${label} has ${time.length} times and ${signal.length} signals; as many of one as of the other are needed.`,
    );
  if (time.length < FEWEST_POINTS)
    return failure(
      "too-few-points",
      `${path}.time`,
      `Run ${label} has ${time.length} readings; at least ${FEWEST_POINTS} are needed, since its offset and its own rate are fitted.`,
    );
  const reading = readingFault(label, path, inRow(time), inRow(signal));
  if (reading !== null) return reading;
  for (const { name } of species) {
    const concentration = concentrations[name];
    if (concentration === undefined || !(concentration >= 0 && Number.isFinite(concentration)))
      return failure(
        "bad-input",
        `${path}.concentrations.${name}`,
        `The starting concentration of ${name} in run ${label} is ${concentration ?? "missing"}; a finite number from 0 on is needed.`,
      );
  }
  if (
    endSignal !== undefined &&
    !(Number.isFinite(endSignal.value) && (endSignal.standardUncertainty ?? 0) >= 0)
  )
    return failure(
      "bad-input",
      `${path}.endSignal`,
      `The end signal of run ${label} needs a finite value and a standard uncertainty from 0 on, or null where it is one reading.`,
    );
  if (timeZero !== undefined && !(Number.isFinite(timeZero.value) && timeZero.standardUncertainty >= 0))
    return failure(
      "bad-input",
      `${path}.timeZero`,
      `Time zero of run ${label} needs a finite value and a standard uncertainty from 0 on.`,
    );
  return null;
}

/** One loop over doubles that most traces pass; the place at fault is looked at again for its sentence. */
function readingFault(
  label: string,
  path: string,
  time: Float64Array,
  signal: Float64Array,
): GlobalFitFailure | null {
  let previous = -Number.MIN_VALUE;
  for (let i = 0; i < time.length; i++) {
    const t = time[i] ?? Number.NaN;
    const y = signal[i] ?? Number.NaN;
    if (!(t > previous && t < Number.MAX_VALUE))
      return failure(
        "bad-input",
        `${path}.time.${i}`,
        `Time ${i + 1} of run ${label} is ${t}; times count from mixing, so they start at 0 or later and strictly increase.`,
      );
    previous = t;
    // Only what is not finite differs from itself.
    if (y - y !== 0)
      return failure(
        "bad-input",
        `${path}.signal.${i}`,
        `Signal ${i + 1} of run ${label} is ${y}; a finite number is needed.`,
      );
  }
  return null;
}

function preparedRun(
  run: GlobalFitRun,
  species: readonly StudySpecies[],
  followed: number,
  followedNumber: number,
  scale: number,
): PreparedRun {
  const concentrations = Float64Array.from(species, ({ name }) => run.concentrations[name] ?? 0);
  const time = inRow(run.time);
  const signal = inRow(run.signal);
  let least = -Number.MAX_VALUE;
  let most = Number.MAX_VALUE;
  species.forEach(({ stoichiometricNumber }, i) => {
    const extent = (concentrations[i] ?? 0) / Math.abs(stoichiometricNumber);
    if (stoichiometricNumber < 0) most = Math.min(most, extent);
    if (stoichiometricNumber > 0) least = Math.max(least, -extent);
  });
  const { endSignal, timeZero } = run;
  return {
    label: run.label,
    concentrations,
    time,
    signal,
    spacing: spacingOf(time),
    followedStart: concentrations[followed] ?? 0,
    least,
    most,
    span: spanOf(signal, scale * followedNumber, most),
    endSignal:
      endSignal === undefined
        ? null
        : {
            value: endSignal.value,
            variance: endSignal.standardUncertainty === null ? null : endSignal.standardUncertainty ** 2,
          },
    timeZero:
      timeZero === undefined ? null : { value: timeZero.value, variance: timeZero.standardUncertainty ** 2 },
  };
}

/** As doubles in a row; what is that already is read where it stands, never written. */
function inRow(values: ArrayLike<number>): Float64Array {
  return values instanceof Float64Array ? values : new Float64Array(values);
}

/** Extent that the signal runs through, noise and all, but no more than there is. */
function spanOf(signal: Float64Array, factor: number, most: number): number {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (let i = 0; i < signal.length; i++) {
    const value = signal[i] ?? 0;
    if (value < low) low = value;
    if (value > high) high = value;
  }
  const seen = (high - low) / Math.abs(factor);
  if (most > 0 && (!(seen > 0) || seen > most)) return most < Number.MAX_VALUE ? most : 1;
  return seen > 0 ? seen : 1;
}
