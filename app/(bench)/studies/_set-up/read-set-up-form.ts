import { parseReaction } from "@/app/_worksheet/reaction/parse-reaction";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import { parseUncertain } from "@/app/_worksheet/typed-number/parse-uncertain";
import type { SetUp } from "@/db/study/set-up.schema";
import type { SetUpForm } from "./set-up-form.schema";

/** Names a box by its path in the form ("species.0.symbol") with the sentence that stands under it. */
export interface FormFault {
  readonly path: string;
  readonly message: string;
}

export type SetUpReading =
  | { readonly status: "read"; readonly setUp: SetUp }
  | { readonly status: "faults"; readonly faults: readonly FormFault[] };

type UncertainOrNull = { value: number; standardUncertainty: number } | null;

const ZERO_CELSIUS = 273.15;
const JOULES_PER_KILOJOULE = 1000;

/** Texts of the boxes into the sheet's units; all faults at once. `newId` gives the id of a species that is new. */
export function readSetUpForm(form: SetUpForm, newId: () => string): SetUpReading {
  const faults: FormFault[] = [];
  const fault = (path: string, message: string) => {
    faults.push({ path, message });
  };
  if (form.name.trim() === "") fault("name", "A study needs a name, such as the reaction in words.");
  const reaction = parseReaction(form.reaction);
  if (reaction.status === "unreadable") fault("reaction", reaction.message);

  const species = form.species.map((row, position) => {
    const { followed: _, id, ...rest } = row;
    return { ...rest, symbol: row.symbol.trim(), name: row.name.trim(), id: id || newId(), position };
  });
  checkSymbols(form, fault);
  const followedIndex = form.species.findIndex((row) => row.followed);
  if (form.species[followedIndex]?.stoichiometricNumber === 0) {
    fault(
      `species.${followedIndex}.followed`,
      "The reaction leaves this species alone; follow one that it changes.",
    );
  }

  const temperature = uncertainOf(form.temperature, "temperature", fault);
  const temperatureKelvin =
    temperature === null ? null : { ...temperature, value: rounded(temperature.value + ZERO_CELSIUS) };
  if (temperatureKelvin !== null && temperatureKelvin.value <= 0) {
    fault("temperature", `${form.temperature} °C is below absolute zero.`);
  }
  const conditions: SetUp["conditions"] = {
    temperatureKelvin,
    ionicStrengthMolar: notNegative(form.ionicStrength, "ionicStrength", "An ionic strength", fault),
    pathLengthCentimetre: notNegative(form.pathLength, "pathLength", "A path length", fault),
    wavelengthNanometre: positiveOf(form.wavelength, "wavelength", "A wavelength is above 0 nm.", fault),
    activationEnergy: activationEnergyOf(form.activationEnergy, fault),
    sampleIntervalSeconds: positiveOf(
      form.sampleInterval,
      "sampleInterval",
      "The time between readings is above 0 s.",
      fault,
    ),
    solvent: form.solvent.trim(),
    electrolyte: form.electrolyte.trim(),
  };
  const signal = signalOf(form, fault);
  if (faults.length > 0) return { status: "faults", faults };
  return {
    status: "read",
    setUp: {
      study: {
        name: form.name.trim(),
        reaction: form.reaction.trim(),
        timeUnit: form.timeUnit,
        hazards: form.hazards.trim(),
      },
      species,
      followedSpeciesId: species[followedIndex]?.id ?? null,
      conditions,
      signal,
    },
  };
}

type Fault = (path: string, message: string) => void;

function checkSymbols(form: SetUpForm, fault: Fault): void {
  const seen = new Map<string, number>();
  form.species.forEach((row, index) => {
    const symbol = row.symbol.trim();
    if (symbol === "") {
      if (row.inLaw) fault(`species.${index}.symbol`, "A species of the law needs a symbol, such as A.");
    } else if (seen.has(symbol)) {
      fault(`species.${index}.symbol`, `${symbol} is the symbol of another species already.`);
    }
    seen.set(symbol, index);
  });
}

function signalOf({ signal }: SetUpForm, fault: Fault): SetUp["signal"] {
  if (signal.kind === "none") return null;
  if (signal.kind === "concentration") return { kind: "concentration", unit: signal.concentrationUnit };
  const perMolar = uncertainOf(signal.perMolar, "signal.perMolar", fault);
  if (perMolar === null) {
    // An empty box is allowed: the factor is often measured after the runs, and no rate in mol L⁻¹ is made without it.
    return null;
  }
  if (perMolar.value === 0)
    fault("signal.perMolar", "A factor of 0 gives no signal; enter the slope of the calibration.");
  if (signal.quantity.trim() === "") fault("signal.quantity", "Name the signal, such as Absorbance.");
  return {
    kind: "calibrated",
    quantity: signal.quantity.trim(),
    unit: signal.unit.trim(),
    perMolar,
    blank: uncertainOf(signal.blank, "signal.blank", fault),
  };
}

function uncertainOf(text: string, path: string, fault: Fault): UncertainOrNull {
  const reading = parseUncertain(text);
  if (reading.status === "uncertain") {
    return { value: reading.value, standardUncertainty: reading.standardUncertainty };
  }
  if (reading.status === "not-readable") fault(path, reading.message);
  return null;
}

function notNegative(text: string, path: string, noun: string, fault: Fault): UncertainOrNull {
  const reading = uncertainOf(text, path, fault);
  if (reading !== null && reading.value < 0) fault(path, `${noun} is not negative.`);
  return reading;
}

function positiveOf(text: string, path: string, otherwise: string, fault: Fault): number | null {
  const reading = parseNumber(text);
  if (reading.status === "not-a-number") fault(path, reading.message);
  if (reading.status !== "number") return null;
  if (reading.value <= 0) fault(path, otherwise);
  return reading.value;
}

/** Typed in kJ mol⁻¹. Far above what a reaction in solution has, J mol⁻¹ were meant. */
function activationEnergyOf(text: string, fault: Fault): UncertainOrNull {
  const reading = notNegative(text, "activationEnergy", "An activation energy", fault);
  if (reading === null) return null;
  if (reading.value > LARGEST_ACTIVATION_ENERGY)
    fault(
      "activationEnergy",
      `${text.trim()} kJ mol^-1 is beyond any reaction in solution; write it in kJ mol^-1.`,
    );
  return {
    value: rounded(reading.value * JOULES_PER_KILOJOULE),
    standardUncertainty: rounded(reading.standardUncertainty * JOULES_PER_KILOJOULE),
  };
}

/** kJ mol⁻¹; the strongest single bonds take some 600. */
const LARGEST_ACTIVATION_ENERGY = 1000;

/** Drops the last digits' noise of a sum in binary: 26.8 + 273.15 is 299.95. */
function rounded(value: number): number {
  return Number(value.toPrecision(12));
}
