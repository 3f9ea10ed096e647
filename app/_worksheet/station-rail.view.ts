import { printNumber, printUncertain } from "kinetics-core/quantities";
import type { StationState, StationView } from "@/app/_ui/law-view";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { Check, StudyAnalysis } from "./analysis";
import { lawName } from "./law-name";
import { list } from "./missing-law";
import { lawSpecies } from "./present-runs";
import { printExponent } from "./print-order";
import { calibratedStandards } from "./standards/calibrated-standards";
import { slopeOfStandards } from "./standards/recalibrated";
import { slopeName } from "./standards/slope-name";
import { standardsFlags } from "./standards/standards-flags";
import { standingConstant, standingOrders } from "./standing-constant";
import { STATION_NAMES, STATIONS, type Station } from "./station";

/** The rail: every station that exists, with its worst open check and what it yields in one line. */
export function stationRailView(
  sheet: Sheet,
  analysis: StudyAnalysis,
  hrefOf: (station: Station) => string,
): readonly StationView[] {
  return STATIONS.map((station) => ({
    name: STATION_NAMES[station],
    href: hrefOf(station),
    state: stateOf(station, sheet, analysis),
    yield: YIELDS[station](sheet, analysis),
  }));
}

function stateOf(station: Station, sheet: Sheet, analysis: StudyAnalysis): StationState {
  const started: Record<Station, boolean> = {
    "set-up": sheet.species.length > 0,
    standards: calibratedStandards(sheet).status === "calibrated",
    runs: analysis.runs.length > 0,
    rates: analysis.runs.some((run) => run.rate.kind !== "none"),
    "rate-law": analysis.law.status === "law",
  };
  const checks = analysis.checks.filter((check) => check.station === station && check.settled === null);
  // Standards that no signal follows weaken no law, and are looked at all the same.
  const flags = station === "standards" ? standardsFlags(sheet, analysis.runs) : [];
  const open: readonly Pick<Check, "severity">[] = [...checks, ...flags];
  if (open.some((check) => check.severity === "blocks")) return "blocks";
  if (open.some((check) => check.severity === "weakens")) return "weakens";
  return started[station] ? "holds" : "open";
}

const YIELDS: Readonly<Record<Station, (sheet: Sheet, analysis: StudyAnalysis) => string>> = {
  "set-up": (sheet) => {
    const names = lawSpecies(sheet).map(lawName);
    const kelvin = sheet.conditions.temperatureKelvin?.value;
    const parts = [
      ...(names.length === 0 ? [] : [list(names)]),
      ...(kelvin === undefined ? [] : [`${(kelvin - 273.15).toFixed(1).replace("-", "\u2212")} °C`]),
    ];
    return parts.join(", ") || "nothing entered";
  },
  standards: (sheet) => {
    const line = calibratedStandards(sheet);
    const slope = slopeOfStandards(sheet);
    if (line.status === "no-line" || slope === null)
      return sheet.standards.length === 0 ? "none" : "no line yet";
    const value = printUncertain(slope.value, slope.standardUncertainty);
    const power = value.power === 0 ? "" : ` × 10^${value.power}`;
    const standards = line.used.length === 1 ? "1 standard" : `${line.used.length} standards`;
    return `${slopeName(sheet)} ${value.value}${power}, ${standards}`;
  },
  runs: (_sheet, { runs }) => {
    const aside = runs.filter((run) => run.state === "set-aside").length;
    const all = runs.length === 1 ? "1 run" : `${runs.length === 0 ? "no" : runs.length} runs`;
    return aside === 0 ? all : `${all}, ${aside} set aside`;
  },
  rates: (_sheet, { runs }) => {
    const relative = runs
      .flatMap(({ state, rate }) =>
        state === "standing" && rate.kind !== "none" && rate.standardError !== null
          ? [rate.standardError / rate.molarPerSecond]
          : [],
      )
      .sort((a, b) => a - b);
    const median = medianOf(relative);
    if (median !== null) return `median *u* ${printNumber(median * 100, 2)} %`;
    const rates = runs.filter((run) => run.rate.kind !== "none").length;
    return rates === 0 ? "no rate yet" : rates === 1 ? "1 rate" : `${rates} rates`;
  },
  "rate-law": (sheet, { law }) => {
    if (law.status === "no-law") return "no law yet";
    const orders = standingOrders(sheet, law.fit).map(
      ({ name, heldAt }) => `[${name}]^{${printExponent(law.fit, name, heldAt)}}`,
    );
    const { estimate, interval } = standingConstant(sheet, law.fit).estimate;
    const width =
      estimate === null || interval === null
        ? ""
        : `, ±${printNumber(((interval[1] - interval[0]) / 2 / estimate) * 100, 2)} %`;
    return `${orders.join(" ")}${width}`;
  },
};

/** Of ascending numbers. */
function medianOf(sorted: readonly number[]): number | null {
  const middle = Math.floor(sorted.length / 2);
  const upper = sorted[middle];
  const lower = sorted[sorted.length - 1 - middle];
  return upper === undefined || lower === undefined ? null : (upper + lower) / 2;
}
