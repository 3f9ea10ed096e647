import Papa from "papaparse";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import type { RunAnalysis, StudyAnalysis } from "../analysis";
import { concentrationDisplay, rateDisplay, timeDisplay } from "../display-units";
import { lawName } from "../law-name";
import { lawSpecies, presentRuns } from "../present-runs";

/**
 * Every run with its starting concentrations and its rate, as comma-separated text in UTF-8 for a colleague's own
 * tools. Full precision, units in the heads, an empty cell for what is not known.
 */
export function runsAndRatesTable(sheet: Sheet, analysis: StudyAnalysis): string {
  const species = lawSpecies(sheet);
  const rate = rateDisplay(sheet);
  const time = timeDisplay(sheet);
  const analysed = new Map(analysis.runs.map((run) => [run.runId, run]));
  const heads = [
    "run",
    "state",
    "reason",
    ...species.flatMap((one) => {
      const { unit } = concentrationDisplay(one.unit);
      return [`[${lawName(one)}]0 / ${unit}`, `u([${lawName(one)}]0) / ${unit}`];
    }),
    "temperature / degC",
    "temperature of",
    "block",
    `rate / ${rate.unit}`,
    `u(rate) / ${rate.unit}`,
    "estimator",
    `window from / ${time.unit}`,
    `window to / ${time.unit}`,
    "points in window",
    "conversion at window end",
    "noise autocorrelation",
    "readings",
  ];
  const rows = presentRuns(sheet).flatMap((run) => {
    const one = analysed.get(run.id);
    if (one === undefined) return [];
    return [
      [
        run.label,
        one.state,
        run.setAside?.reason ?? (one.rate.kind === "none" ? one.rate.reason : ""),
        ...species.flatMap(({ id, unit }) => {
          const amount = run.concentrations[id];
          if (amount === undefined) return [null, null];
          const shown = amount.molar * concentrationDisplay(unit).factor;
          return [exact(shown), exact(shown * amount.relativeUncertainty)];
        }),
        ...temperatureCells(sheet, run),
        run.block,
        ...rateCells(run, one, rate.factor, time.factor),
      ],
    ];
  });
  return commaSeparated([heads, ...rows]);
}

/** The run's own temperature, else the study's, which stands in for it in the analysis too; and which it is. */
function temperatureCells(sheet: Sheet, run: SheetRun) {
  const own = run.temperatureKelvin;
  const kelvin = own ?? sheet.conditions.temperatureKelvin?.value ?? null;
  return kelvin === null ? [null, null] : [exact(kelvin - 273.15), own === null ? "study" : "run"];
}

function rateCells(run: SheetRun, { rate }: RunAnalysis, rateFactor: number, timeFactor: number) {
  const readings = run.trace?.points ?? null;
  if (rate.kind === "none") return [null, null, null, null, null, null, null, null, readings];
  const measured = [
    exact(rate.molarPerSecond * rateFactor),
    rate.standardError === null ? null : exact(rate.standardError * rateFactor),
  ];
  if (rate.kind === "entered") return [...measured, "entered", null, null, null, null, null, readings];
  const { estimator, window, points, conversion, autocorrelation } = rate.initialRate;
  return [
    ...measured,
    estimator,
    exact(window[0] * timeFactor),
    exact(window[1] * timeFactor),
    points,
    conversion === null ? null : exact(conversion),
    exact(autocorrelation),
    readings,
  ];
}

/** Twelve digits: all that the numbers carry, without the last bit's rounding from a change of unit. */
function exact(value: number): number {
  return Number(value.toPrecision(12));
}

/** The library's own pattern ends at a line break, so that "=1+1" and a second line would pass. */
const FORMULA = /^\s*[=+\-@\uff1d\uff0b\uff0d\uff20]|^[\t\r\n]/;

/** A line a row. A cell that a spreadsheet would run as a formula gets an apostrophe; labels come from people. */
export function commaSeparated(rows: readonly (readonly (string | number | null)[])[]): string {
  if (rows.length === 0) return "";
  return `${Papa.unparse(
    rows.map((row) => [...row]),
    { escapeFormulae: FORMULA, newline: "\n" },
  )}\n`;
}
