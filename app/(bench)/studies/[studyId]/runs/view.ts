import { printUncertain } from "kinetics-core/quantities";
import { type PrintedConcentrations, printConcentrations } from "@/app/_findings/print-concentrations";
import type { RunAnalysis, RunMark, StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { lawSpecies, presentRuns } from "@/app/_worksheet/present-runs";
import { variedSpecies } from "@/app/_worksheet/run-marks";
import { plainNumber } from "@/app/_worksheet/standing-law.view";
import { countInWords, dayInWords } from "@/app/_worksheet/words";
import type { Sheet, SheetRun, SheetSpecies } from "@/db/sheet/sheet.schema";

/** The run sheet as it is drawn: groups of rows by series, every text ready. */
export interface RunSheetView {
  /** "Eleven runs, nine standing" */
  readonly title: string;
  /** Prose. */
  readonly lead: string;
  readonly columns: readonly ConcentrationColumn[];
  readonly groups: readonly RunGroup[];
  /** "70 s, window marked" */
  readonly sparkNote: string;
  readonly bin: readonly BinnedRun[];
}

export interface ConcentrationColumn {
  readonly speciesId: string;
  /** Prose, "[A]_0". */
  readonly head: string;
  /** Plain text, "µmol L^-1". */
  readonly unit: string;
  readonly integerDigits: number;
  readonly fractionDigits: number;
}

export interface RunGroup {
  readonly key: string;
  readonly name: string;
  /** Prose after the name: ", [A] held at 50.0 µmol L^-1. Solid marks". */
  readonly detail: string;
  readonly rows: readonly RunRow[];
}

export interface RunRow {
  readonly runId: string;
  readonly label: string;
  readonly mark: RunMark;
  readonly state: RunAnalysis["state"];
  /** In the order of the columns; null where the sheet holds none. */
  readonly concentrations: readonly (string | null)[];
  /** °C */
  readonly cell: string | null;
  readonly points: string | null;
  readonly traceSha256: string | null;
  /** First and last time used, seconds on the trace's clock. */
  readonly windowSeconds: readonly [number, number] | null;
  /** Instead of a trace: prose, "entered 1.18 ± 0.02 µmol L^-1 s^-1". */
  readonly entered: string | null;
  /** Prose. */
  readonly remark: string;
}

export interface BinnedRun {
  readonly runId: string;
  readonly label: string;
  readonly note: string;
}

/** @param initials of the group's members by id, for who set a run aside. */
export function runSheetView(
  sheet: Sheet,
  analysis: StudyAnalysis,
  initials: ReadonlyMap<string, string>,
): RunSheetView {
  const runs = presentRuns(sheet);
  const species = lawSpecies(sheet);
  const printed = species.map((one) => printConcentrations(one, runs));
  const analysed = new Map(analysis.runs.map((run) => [run.runId, run]));
  const rows = runs.flatMap((run, index) => {
    const found = analysed.get(run.id);
    return found ? [{ run, analysed: found, row: rowOf(sheet, run, found, printed, index, initials) }] : [];
  });
  const binned = sheet.runs.filter((run) => run.removedIn !== null);
  return {
    title: titleOf(analysis.runs),
    lead: leadOf(sheet, analysis.runs),
    columns: species.map((one, index) => ({
      speciesId: one.id,
      head: `[${one.symbol}]_0`,
      unit: concentrationDisplay(one.unit).unit,
      integerDigits: printed[index]?.integerDigits ?? 1,
      fractionDigits: printed[index]?.fractionDigits ?? 0,
    })),
    groups: groupsOf(sheet, rows),
    sparkNote: "window marked",
    bin: binned
      .toSorted((a, b) => (b.removedIn ?? 0) - (a.removedIn ?? 0))
      .map((run) => ({ runId: run.id, label: run.label, note: `put there in revision ${run.removedIn}` })),
  };
}

function rowOf(
  sheet: Sheet,
  run: SheetRun,
  { mark, state, rate }: RunAnalysis,
  printed: readonly PrintedConcentrations[],
  index: number,
  initials: ReadonlyMap<string, string>,
): RunRow {
  return {
    runId: run.id,
    label: run.label,
    mark,
    state,
    concentrations: printed.map(({ texts }) => texts[index] ?? null),
    cell:
      run.temperatureKelvin === null ? null : (run.temperatureKelvin - 273.15).toFixed(1).replace("-", "−"),
    points: run.trace === null ? null : String(run.trace.points),
    traceSha256: run.trace?.sha256 ?? null,
    windowSeconds: rate.kind === "estimated" ? rate.initialRate.window : null,
    entered: run.enteredRate === null ? null : enteredRate(sheet, run.enteredRate),
    remark: remarkOf(run, rate, initials),
  };
}

function enteredRate(
  sheet: Sheet,
  { molarPerSecond, standardError }: NonNullable<SheetRun["enteredRate"]>,
): string {
  const { unit, factor } = rateDisplay(sheet);
  const number = printUncertain(
    molarPerSecond * factor,
    standardError === null ? null : standardError * factor,
    { digits: 2 },
  );
  return `entered, ${plainNumber({ number, unit })}`;
}

function remarkOf(run: SheetRun, rate: RunAnalysis["rate"], initials: ReadonlyMap<string, string>): string {
  if (run.setAside !== null) {
    const who = initials.get(run.setAside.memberId);
    return `Set aside: ${run.setAside.reason}${who === undefined ? "" : ` (${who}, ${dayInWords(run.setAside.at)})`}`;
  }
  const measured = run.trace !== null || run.enteredRate !== null;
  const why = measured && rate.kind === "none" ? rate.reason : "";
  return [run.remark, why].filter((part) => part !== "").join(" ");
}

function titleOf(runs: readonly RunAnalysis[]): string {
  const standing = runs.filter((run) => run.state === "standing").length;
  if (runs.length === 0) return "No runs yet";
  const all = `${countInWords(runs.length)} ${runs.length === 1 ? "run" : "runs"}`;
  return standing === runs.length && runs.length > 1
    ? `${all}, all standing`
    : `${all}, ${countInWords(standing).toLowerCase()} standing`;
}

const FILLS: Readonly<Record<string, string>> = { first: "solid", second: "open", third: "open with a dot" };

function leadOf(sheet: Sheet, runs: readonly RunAnalysis[]): string {
  const varied = variedSpecies(sheet).slice(0, 3);
  if (runs.length === 0 || varied.length === 0) return "Each run keeps one mark on every page.";
  const fills = varied.map((id, index) => {
    const species = sheet.species.find((one) => one.id === id);
    return `${FILLS[["first", "second", "third"][index] ?? "third"]} for ${species ? nameOf(species) : ""}`;
  });
  return `Each run keeps one mark on every page: shape and shade rise with concentration, ${fills.join(", ")}.`;
}

interface PlacedRow {
  readonly run: SheetRun;
  readonly analysed: RunAnalysis;
  readonly row: RunRow;
}

const MARKS: Readonly<Record<string, string>> = {
  first: "Solid marks",
  second: "Open marks",
  third: "Open marks with a dot",
};

function groupsOf(sheet: Sheet, rows: readonly PlacedRow[]): RunGroup[] {
  const measured = rows.filter(({ run }) => run.trace !== null || run.enteredRate !== null);
  const planned = rows.filter((row) => !measured.includes(row));
  const varied = variedSpecies(sheet);
  const groups = (["base", "first", "second", "third"] as const).flatMap((series, index): RunGroup[] => {
    const members = measured.filter(({ analysed }) => analysed.mark.series === series);
    if (members.length === 0) return [];
    const ordered = members.toSorted(
      (a, b) => a.analysed.mark.level - b.analysed.mark.level || a.run.position - b.run.position,
    );
    const species = sheet.species.find((one) => one.id === varied[index - 1]);
    return [
      {
        key: series,
        name:
          series === "base"
            ? "Base recipe"
            : `${species ? sentenceStart(nameOf(species)) : "Several"} varied`,
        detail:
          series === "base"
            ? baseDetail(varied.length)
            : `${heldDetail(sheet, species, members)}. ${MARKS[series]}`,
        rows: ordered.map(({ row }) => row),
      },
    ];
  });
  if (planned.length > 0) {
    groups.push({
      key: "planned",
      name: "Planned",
      detail: ", no trace yet. Not part of the law",
      rows: planned.map(({ row }) => row),
    });
  }
  return groups;
}

function baseDetail(series: number): string {
  if (series === 0) return "";
  return series === 1
    ? ", part of the series"
    : series === 2
      ? ", centre of both series"
      : ", centre of the series";
}

/** Names what all runs of the group have in common; what differs among them is left out. */
function heldDetail(sheet: Sheet, varied: SheetSpecies | undefined, members: readonly PlacedRow[]): string {
  const held = lawSpecies(sheet).flatMap((species) => {
    if (species.id === varied?.id) return [];
    const values = members.map(({ run }) => run.concentrations[species.id]?.molar ?? 0);
    const [first = 0] = values;
    if (first === 0 || values.some((value) => Math.abs(value - first) > 0.005 * first)) return [];
    const [text] = printConcentrations(
      species,
      members.slice(0, 1).map(({ run }) => run),
    ).texts;
    return text ? [`[${species.symbol}] held at ${text} ${concentrationDisplay(species.unit).unit}`] : [];
  });
  return held.length === 0 ? "" : `, ${held.join(", ")}`;
}

function nameOf(species: SheetSpecies): string {
  return species.name || species.symbol;
}

function sentenceStart(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
