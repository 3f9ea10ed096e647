import { decimate } from "@/app/_figures/decimate";
import type { CheckSeverity } from "@/app/_ui/check";
import type { Check, RunMark, StudyAnalysis } from "@/app/_worksheet/analysis";
import { gatherNotes } from "@/app/_worksheet/checks/gather-notes";
import { type LawSnapshot, lawSnapshot } from "@/app/_worksheet/law-effect";
import { presentRuns } from "@/app/_worksheet/present-runs";
import { countInWords } from "@/app/_worksheet/words";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { LastEntry } from "@/db/study/last-entries";
import type { OpenStudy } from "@/db/study/study.queries";

/** One line of the list of studies. */
export interface StudyRow {
  readonly studyId: string;
  readonly number: number;
  readonly name: string;
  readonly invented: boolean;
  /** "25.0 °C, *I* = 0.10, absorbance at 400 nm"; prose. */
  readonly conditions: string;
  readonly law: LawSnapshot;
  readonly runs: number;
  readonly aside: number;
  readonly checks: { readonly severity: CheckSeverity; readonly words: string } | null;
  readonly lastEntry: string;
  readonly by: string;
  readonly thumbnail: readonly ThumbnailTrace[];
  /** Lower case: what the search looks in. */
  readonly searched: string;
}

/** In the unit square, y upwards. */
export interface ThumbnailTrace {
  readonly x: readonly number[];
  readonly y: readonly number[];
  readonly mark: RunMark;
}

interface StudyData {
  readonly study: OpenStudy;
  readonly analysis: StudyAnalysis;
  readonly traces: ReadonlyMap<
    string,
    { readonly timeSeconds: readonly number[]; readonly signal: readonly number[] }
  >;
  readonly lastEntry: LastEntry | undefined;
  /** The present, for "Today". */
  readonly now: Date;
}

export function studyRow({ study, analysis, traces, lastEntry, now }: StudyData): StudyRow {
  const { sheet } = study;
  const standing = analysis.runs.filter((run) => run.state === "standing").length;
  const aside = analysis.runs.filter((run) => run.state === "set-aside").length;
  return {
    studyId: study.studyId,
    number: study.number,
    name: sheet.study.name,
    invented: sheet.study.invented,
    conditions: conditionsOf(sheet),
    law: lawSnapshot(sheet, analysis),
    runs: standing,
    aside,
    checks: checksOf(analysis),
    lastEntry: dayInWords(lastEntry?.at ?? study.updatedAt, now),
    by: (lastEntry?.by ?? []).join(", "),
    thumbnail: thumbnailOf(sheet, analysis, traces),
    searched: searchedText(sheet),
  };
}

/** Six studies, four with a standing law. */
export function listLead(rows: readonly StudyRow[]): string {
  const withLaw = rows.filter((row) => row.law.status === "law").length;
  const all = `${countInWords(rows.length)} ${rows.length === 1 ? "study" : "studies"}`;
  if (withLaw === 0) return `${all}, none with a standing law yet.`;
  return `${all}, ${withLaw === rows.length ? (rows.length === 1 ? "with a standing law" : "all with a standing law") : `${countInWords(withLaw).toLowerCase()} with a standing law`}.`;
}

/** Every word of the question must occur in the name, a species, the reaction or the conditions. */
export function matches(row: StudyRow, question: string): boolean {
  const words = question
    .toLowerCase()
    .split(/\s+/)
    .filter((word) => word !== "");
  return words.every((word) => row.searched.includes(word));
}

function conditionsOf({ conditions, signal }: Sheet): string {
  const { temperatureKelvin, ionicStrengthMolar, wavelengthNanometre } = conditions;
  const quantity =
    signal === null ? "" : signal.kind === "concentration" ? "concentration" : signal.quantity.toLowerCase();
  return [
    temperatureKelvin === null ? "" : `${(temperatureKelvin.value - 273.15).toFixed(1).replace("-", "−")} °C`,
    ionicStrengthMolar === null ? "" : `*I* = ${Number(ionicStrengthMolar.value.toPrecision(3))} mol L^-1`,
    quantity === ""
      ? ""
      : wavelengthNanometre === null
        ? quantity
        : `${quantity} at ${wavelengthNanometre} nm`,
  ]
    .filter((part) => part !== "")
    .join(", ");
}

function searchedText(sheet: Sheet): string {
  const { conditions, signal, species, study } = sheet;
  return [
    study.name,
    study.reaction,
    ...species.flatMap(({ symbol, name, formula }) => [symbol, name, formula]),
    conditions.solvent,
    conditions.electrolyte,
    conditions.wavelengthNanometre === null ? "" : `${conditions.wavelengthNanometre} nm`,
    signal?.kind === "calibrated" ? signal.quantity : "",
    study.invented ? "invented" : "",
  ]
    .join(" ")
    .toLowerCase();
}

const NOUNS: Readonly<Record<"blocks" | "weakens" | "note", readonly [string, string]>> = {
  blocks: ["blocks", "block"],
  weakens: ["weakens", "weaken"],
  note: ["note", "notes"],
};

function checksOf({ checks, runs, law }: StudyAnalysis): StudyRow["checks"] {
  if (law.status === "no-law") return null;
  const open = gatherNotes(checks, runs).filter((check: Check) => check.settled === null);
  for (const severity of ["blocks", "weakens", "note"] as const) {
    const count = open.filter((check) => check.severity === severity).length;
    if (count > 0) return { severity, words: `${count} ${NOUNS[severity][count === 1 ? 0 : 1]}` };
  }
  return { severity: "holds", words: "holds" };
}

const MONTHS = ["Jan", "Feb", "Mar", "Apr", "May", "Jun", "Jul", "Aug", "Sep", "Oct", "Nov", "Dec"];

function dayInWords(at: string, now: Date): string {
  const then = new Date(at);
  const day = `${then.getUTCDate()} ${MONTHS[then.getUTCMonth()]}`;
  if (at.slice(0, 10) === now.toISOString().slice(0, 10)) return `Today, ${at.slice(11, 16)}`;
  return then.getUTCFullYear() === now.getUTCFullYear() ? day : `${day} ${then.getUTCFullYear()}`;
}

const MOST_TRACES = 12;
const THUMBNAIL_COLUMNS = 28;

/** Standing traces on common axes from zero time; of many, every so-manieth. */
function thumbnailOf(sheet: Sheet, analysis: StudyAnalysis, traces: StudyData["traces"]): ThumbnailTrace[] {
  const runs = new Map(presentRuns(sheet).map((run) => [run.id, run]));
  const all = analysis.runs.flatMap((analysed) => {
    const run = runs.get(analysed.runId);
    const trace = run?.trace ? traces.get(run.trace.sha256) : undefined;
    if (!run || !trace || analysed.state === "set-aside") return [];
    const { x, y } = decimate(trace.timeSeconds, trace.signal, THUMBNAIL_COLUMNS);
    return [{ x: x.map((time) => time - run.timeZeroSeconds), y, mark: analysed.mark }];
  });
  const every = Math.ceil(all.length / MOST_TRACES);
  const shown = all.filter((_, index) => index % every === 0);
  const [, latest] = extent(shown.flatMap(({ x }) => x));
  const [lowest, highest] = extent(shown.flatMap(({ y }) => y));
  const height = highest - lowest || 1;
  return shown.map(({ x, y, mark }) => ({
    x: x.map((time) => time / (latest || 1)),
    y: y.map((signal) => (signal - lowest) / height),
    mark,
  }));
}

function extent(values: readonly number[]): [number, number] {
  let low = Number.POSITIVE_INFINITY;
  let high = Number.NEGATIVE_INFINITY;
  for (const value of values) {
    if (value < low) low = value;
    if (value > high) high = value;
  }
  return values.length === 0 ? [0, 1] : [low, high];
}
