import { printUncertain } from "kinetics-core/quantities";
import type { RateLawFit } from "kinetics-core/rate-law";
import { type PrintedConcentrations, printConcentrations } from "@/app/_findings/print-concentrations";
import type { RunState } from "@/app/_ui/run-mark";
import type { RunAnalysis, StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { lawName } from "@/app/_worksheet/law-name";
import { lawSpecies, presentRuns } from "@/app/_worksheet/present-runs";
import { type ColumnText, columnOf, type PrintedColumn } from "@/app/_worksheet/printed-column";
import { dayInWords } from "@/app/_worksheet/words";
import type { SharedStudy } from "@/db/share-link/share-link.queries";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { reactionInWords } from "./reaction-in-words";

/** Plain props of the shared page, beyond what it has in common with the stations. */
export interface SharedPageView {
  /** "Study 14, shared by the demo group" */
  readonly overline: string;
  /** "Read-only sheet, as of 14 March 2026" */
  readonly asOf: string;
  /** What the link shows and when it closes. */
  readonly link: string;
  /** Both sides and the followed species with its ν; "" where the set-up does not say. */
  readonly reaction: string;
  readonly evidence: string;
  readonly method: readonly string[];
  readonly runs: SharedRunsView;
}

export interface SharedRunsView {
  readonly concentrations: readonly {
    readonly head: string;
    readonly unit: string;
    readonly column: PrintedColumn;
  }[];
  readonly rate: { readonly unit: string; readonly column: PrintedColumn };
  readonly rows: readonly SharedRunRow[];
}

export interface SharedRunRow {
  readonly label: string;
  readonly mark: RunAnalysis["mark"];
  readonly state: RunState;
  readonly concentrations: readonly (string | null)[];
  readonly rate: ColumnText | null;
  /** Percent of the rate, "−1.2"; null for runs that do not carry the law. */
  readonly residual: string | null;
  /** Why it is set aside or has no rate; prose. */
  readonly remark: string;
}

export function sharedPageView(shared: SharedStudy, analysis: StudyAnalysis): SharedPageView {
  return {
    overline: `Study ${shared.number}, shared by ${shared.groupName}`,
    asOf: `Read-only sheet, as of ${dayInWords(shared.updatedAt)}`,
    link: linkInWords(shared),
    reaction: reactionInWords(shared.sheet),
    evidence: evidenceInWords(analysis),
    method: methodInWords(shared.sheet, analysis),
    runs: sharedRunsView(shared.sheet, analysis),
  };
}

function linkInWords({ frozenRevision, revision, expiresAt }: SharedStudy): string {
  const shows =
    frozenRevision === null
      ? `It follows the study, now at revision ${revision}`
      : `It shows revision ${frozenRevision} of the study, whatever was changed later`;
  const closes =
    expiresAt === null ? "It works until the group revokes it" : `It closes on ${dayInWords(expiresAt)}`;
  return `Anyone with it can read, nobody can edit. ${shows}. ${closes}.`;
}

function evidenceInWords({ runs }: StudyAnalysis): string {
  const standing = runs.filter((run) => run.state === "standing").length;
  const aside = runs.filter((run) => run.state === "set-aside").length;
  return `${standing} standing, ${aside === 0 ? "none" : aside} set aside`;
}

/** How the numbers came about, in the order of the work. */
function methodInWords(sheet: Sheet, { rule, law }: StudyAnalysis): string[] {
  const signal =
    sheet.signal?.kind === "calibrated"
      ? `The ${sheet.signal.quantity.toLowerCase()} becomes a concentration through ${printedFactor(sheet.signal.perMolar)} L mol^-1.`
      : "The traces are concentrations already.";
  const sentences = [
    "The rate is the rate of reaction, *v* = (1/ν) d*c*/d*t* with the signed stoichiometric number ν of the species that is followed.",
    signal,
  ];
  if (rule !== null) sentences.push(rule.reason);
  if (law.status === "law")
    sentences.push(
      "Orders and *k* come from least squares on ln *v* against ln *c*, each run weighted by its own uncertainty and by the scatter between runs. Intervals are Student's *t* at 95 % with the scatter estimated from the runs; that of *k* joins the shared uncertainties of the budget.",
    );
  return sentences;
}

function printedFactor({
  value,
  standardUncertainty,
}: {
  value: number;
  standardUncertainty: number;
}): string {
  if (standardUncertainty === 0) return String(value);
  const printed = printUncertain(value, standardUncertainty, { digits: 2, power: 0 });
  return `${printed.value} ± ${printed.uncertainty}`;
}

function sharedRunsView(sheet: Sheet, analysis: StudyAnalysis): SharedRunsView {
  const runs = presentRuns(sheet);
  const species = lawSpecies(sheet);
  const printed = species.map((one) => printConcentrations(one, runs));
  const { unit, factor } = rateDisplay(sheet);
  const analysed = new Map(analysis.runs.map((run) => [run.runId, run]));
  const rates = columnOf(
    runs.map((run) => {
      const rate = analysed.get(run.id)?.rate;
      if (rate === undefined || rate.kind === "none") return null;
      const uncertainty = rate.standardError === null ? null : rate.standardError * factor;
      return { value: rate.molarPerSecond * factor, uncertainty };
    }),
  );
  const residuals = residualsOf(analysis);
  return {
    concentrations: species.map((one, index) => ({
      head: `[${lawName(one)}]_0`,
      unit: concentrationDisplay(one.unit).unit,
      column: widths(printed[index]),
    })),
    rate: { unit: rates.power === 0 ? unit : `10^${rates.power} ${unit}`, column: rates.column },
    rows: runs.flatMap((run, index): SharedRunRow[] => {
      const one = analysed.get(run.id);
      if (one === undefined) return [];
      return [
        {
          label: one.label,
          mark: one.mark,
          state: one.state,
          concentrations: printed.map(({ texts }) => texts[index] ?? null),
          rate: rates.printed[index] ?? null,
          residual: residuals.get(one.label) ?? null,
          remark: run.setAside?.reason ?? (one.rate.kind === "none" ? one.rate.reason : ""),
        },
      ];
    }),
  };
}

function widths(printed: PrintedConcentrations | undefined): PrintedColumn {
  return { integerDigits: printed?.integerDigits ?? 1, fractionDigits: printed?.fractionDigits ?? 0 };
}

function residualsOf({ law }: StudyAnalysis): ReadonlyMap<string, string> {
  const residuals: RateLawFit["residuals"] = law.status === "law" ? law.fit.residuals : [];
  return new Map(residuals.map((one) => [one.label, signedPercent(100 * Math.expm1(one.residual))]));
}

function signedPercent(percent: number): string {
  const text = Math.abs(percent).toFixed(1);
  return text === "0.0" ? "0.0" : `${percent < 0 ? "−" : "+"}${text}`;
}
