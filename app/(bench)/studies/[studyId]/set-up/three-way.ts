import type { SetUpForm } from "../../_set-up/set-up-form.schema";

/** A box that two people changed to different texts since both saw `base`. */
export interface ContestedBox {
  readonly path: string;
  readonly name: string;
  readonly base: string;
  readonly mine: string;
  readonly theirs: string;
}

const NAMES: Readonly<Record<string, string>> = {
  name: "Name",
  reaction: "Reaction",
  timeUnit: "Unit of time",
  hazards: "Cautions",
  temperature: "Temperature",
  ionicStrength: "Ionic strength",
  pathLength: "Path length",
  wavelength: "Wavelength",
  activationEnergy: "Activation energy",
  sampleInterval: "Time between readings",
  solvent: "Solvent",
  electrolyte: "Inert electrolyte",
  signal: "Signal",
  species: "Species",
};

type Box = keyof SetUpForm;

const BOXES: readonly Box[] = [
  "name",
  "reaction",
  "species",
  "temperature",
  "ionicStrength",
  "pathLength",
  "wavelength",
  "activationEnergy",
  "sampleInterval",
  "solvent",
  "electrolyte",
  "signal",
  "timeUnit",
  "hazards",
];

/** Boxes whose texts clash, to be shown with both values. */
export function contestedBoxes(base: SetUpForm, mine: SetUpForm, theirs: SetUpForm): ContestedBox[] {
  return BOXES.flatMap((box) => {
    const [was, my, their] = [base, mine, theirs].map((form) => printed(form, box));
    if (was === undefined || my === undefined || their === undefined) return [];
    const contested = my !== was && their !== was && my !== their;
    return contested ? [{ path: box, name: NAMES[box] ?? box, base: was, mine: my, theirs: their }] : [];
  });
}

/** Their set-up with my changes laid over it; what only they changed stays theirs. */
export function mineOverTheirs(base: SetUpForm, mine: SetUpForm, theirs: SetUpForm): SetUpForm {
  const changed = BOXES.filter((box) => printed(base, box) !== printed(mine, box));
  return { ...theirs, ...Object.fromEntries(changed.map((box) => [box, mine[box]])) };
}

export function sameForm(left: SetUpForm, right: SetUpForm): boolean {
  return BOXES.every((box) => printed(left, box) === printed(right, box));
}

function printed(form: SetUpForm, box: Box): string {
  const value = form[box];
  if (typeof value === "string") return value.trim();
  if (box === "signal") {
    const { kind, quantity, perMolar, blank, unit, concentrationUnit } = form.signal;
    if (kind === "none") return "none";
    return kind === "concentration"
      ? `concentration in ${concentrationUnit}`
      : `${quantity}, ${perMolar} ${unit}${blank.trim() === "" ? "" : `, blank ${blank.trim()}`}`.trim();
  }
  return form.species
    .map((row) =>
      [
        row.symbol,
        row.name,
        row.formula,
        row.stoichiometricNumber,
        row.charge,
        row.role,
        row.inLaw ? "in the law" : "",
        row.unit,
        row.followed ? "followed" : "",
      ]
        .filter((part) => part !== "")
        .join(" "),
    )
    .join("; ");
}
