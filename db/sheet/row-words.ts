import type { Sheet } from "./sheet.schema";

const fieldWords: Readonly<Record<string, string>> = {
  "study/name": "the study's name",
  "study/invented": "the mark that the data are invented",
  "study/reaction": "the reaction",
  "study/timeUnit": "the unit of time",
  "study/hazards": "the cautions",
  "conditions/temperatureKelvin": "the temperature",
  "conditions/ionicStrengthMolar": "the ionic strength",
  "conditions/pathLengthCentimetre": "the path length",
  "conditions/wavelengthNanometre": "the wavelength",
  "conditions/solvent": "the solvent",
  "conditions/electrolyte": "the inert electrolyte",
  "conditions/activationEnergy": "the activation energy",
  "conditions/referenceIonicStrengthMolar": "the ionic strength that k is referred to",
  "conditions/sampleIntervalSeconds": "the time between readings",
  "mixing/volumeUnit": "the unit of volume",
  "mixing/markMicrolitre": "the mark of the mixtures",
  "mixing/deliveries": "the uncertainty of deliveries",
  "calibration/speciesId": "the species of the standards",
  "calibration/intercept": "the intercept of the calibration line",
  "calibration/weighting": "the weights of the standards",
  "calibration/rangeMolar": "the linear range",
  "calibration/stockRelative": "the uncertainty of the standard stock",
  "sheet/followedSpeciesId": "the followed species",
  "sheet/signal": "the signal",
};

/** Names rows of the sheet (keys of `rowsOf`) as a reader of the page knows them: "R07, the order in A and the solvent". */
export function rowsInWords(keys: Iterable<string>, ...sheets: readonly Sheet[]): string {
  const words = [...keys].map((key) => rowInWords(key, sheets));
  if (words.length > 4) return `${words.slice(0, 3).join(", ")} and ${words.length - 3} more`;
  return words.length < 2 ? words.join("") : `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;
}

function rowInWords(key: string, sheets: readonly Sheet[]): string {
  const field = fieldWords[key];
  if (field !== undefined) return field;
  const slash = key.indexOf("/");
  const section = key.slice(0, slash);
  const id = key.slice(slash + 1);
  if (section === "runs") return find(sheets, (sheet) => sheet.runs, id)?.label ?? "a run";
  if (section === "stocks") {
    const stock = find(sheets, (sheet) => sheet.stocks, id);
    return stock === undefined ? "a stock" : `stock ${stock.symbol || stock.name}`;
  }
  if (section === "standards")
    return `standard ${find(sheets, (sheet) => sheet.standards, id)?.label ?? ""}`.trim();
  if (section === "scans") return `scan ${find(sheets, (sheet) => sheet.scans, id)?.label ?? ""}`.trim();
  if (section === "uploads") return find(sheets, (sheet) => sheet.uploads, id)?.fileName ?? "a file";
  const species = find(sheets, (sheet) => sheet.species, id);
  const name = species?.symbol || species?.name || "a species";
  return section === "orders" ? `the order in ${name}` : `the species ${name}`;
}

function find<T extends { id: string }>(
  sheets: readonly Sheet[],
  rows: (sheet: Sheet) => readonly T[],
  id: string,
): T | undefined {
  for (const sheet of sheets) {
    const row = rows(sheet).find((one) => one.id === id);
    if (row !== undefined) return row;
  }
  return undefined;
}
