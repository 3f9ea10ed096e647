import { chooseFromSurveys, type InitialRateOptions, type StudyRuleChoice } from "kinetics-core/initial-rate";
import type { Kysely } from "kysely";
import { canonicalJson, sha256Of } from "@/db/canonical-json";
import type { Database } from "@/db/database";
import { isMeasurable } from "@/db/limits";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import type { LawAnalysis, RunAnalysis, RunRate, StudyAnalysis } from "./analysis";
import { signalSpan } from "./assemble";
import { findChecks } from "./checks/find-checks";
import { CORE_VERSION } from "./core-version";
import { fittedLaw } from "./fit-law";
import { type CarryingRun, lawInput } from "./law-input";
import { estimated, surveyed } from "./measure-trace";
import { missingForLaw } from "./missing-law";
import { lawSpecies, presentRuns } from "./present-runs";
import { RecentResults } from "./recent-results";
import { runMarks } from "./run-marks";
import { rateOfReaction, rateOptions } from "./run-rate";
import { keepStage, makeStage } from "./stage";
import { initialRateSchema, traceSurveySchema } from "./stored-results";
import { type CountedTrace, countedTrace } from "./trace-counts";
import { type TraceReader, traceReader } from "./trace-reader";

/**
 * The sheet's analysis, in stages that are each kept under the hash of what they depend on:
 *
 *   traces → what each allows (survey) → the study's rule → each run's rate → the law → the checks
 *
 * Surveys and rates read traces and are also kept in the database; the rule, the law and its checks take a
 * millisecond or two and are made afresh, so that setting a run aside costs one fit. The study's rule is chosen
 * from standing runs alone, since a faulty trace must not choose the window of the others; the runs set aside are
 * then measured by the same rule, and carry nothing.
 */
export async function analyseStudy(db: Kysely<Database>, sheet: Sheet): Promise<StudyAnalysis> {
  const hash = sha256Of(canonicalJson([CORE_VERSION, whatCounts(sheet)]));
  return recentAnalyses.get(hash, () => analyse(db, sheet, hash));
}

/** Enough for every study that a group has open at once; one analysis of 300 runs is about half a megabyte. */
const recentAnalyses = new RecentResults<StudyAnalysis>(64);

const surveyStage = makeStage("survey", traceSurveySchema);
const rateStage = makeStage("rate", initialRateSchema);

async function analyse(db: Kysely<Database>, sheet: Sheet, hash: string): Promise<StudyAnalysis> {
  const runs = presentRuns(sheet);
  const readTrace = traceReader(db);
  const rule = await findRule(db, sheet, runs, readTrace);
  const rates = await findRates(db, sheet, runs, rule, readTrace);
  const marks = runMarks(sheet);
  const analysed = runs.map((run): RunAnalysis => {
    const rate = rates.get(run.id) ?? NOT_MEASURED;
    return {
      runId: run.id,
      label: run.label,
      state: run.setAside !== null ? "set-aside" : canCarry(sheet, run, rate) ? "standing" : "without-rate",
      rate,
      mark: marks.get(run.id) ?? { series: "base", level: 0, levels: 1, repeat: false },
    };
  });
  const carrying = runs.flatMap((run, index): CarryingRun[] => {
    const one = analysed[index];
    return one?.state === "standing" && one.rate.kind !== "none" ? [{ run, rate: one.rate }] : [];
  });
  const law = await findLaw(sheet, analysed, carrying);
  return {
    hash,
    rule,
    runs: analysed,
    law,
    checks: findChecks({ sheet, rule, runs: analysed, carrying, law }),
  };
}

const NOT_MEASURED: RunRate = {
  kind: "none",
  reason: "It has neither a trace nor an entered rate. Import its trace or enter its rate on Runs.",
};

/** Whether a run's logarithms exist: a positive rate that a measurement can give and a positive concentration of every species of the law. */
function canCarry(sheet: Sheet, run: SheetRun, rate: RunRate): boolean {
  return (
    rate.kind !== "none" &&
    rate.molarPerSecond > 0 &&
    isMeasurable(rate.molarPerSecond) &&
    lawSpecies(sheet).every((species) => (run.concentrations[species.id]?.molar ?? 0) > 0)
  );
}

async function findLaw(
  sheet: Sheet,
  analysed: readonly RunAnalysis[],
  carrying: readonly CarryingRun[],
): Promise<LawAnalysis> {
  const fittable = lawSpecies(sheet).length > 0 && carrying.length > 0;
  const result = fittable ? await fittedLaw(lawInput(sheet, carrying)) : null;
  const missing = missingForLaw(sheet, analysed, carrying, result);
  const fit = result?.status === "fitted" ? result : null;
  if (missing === null && fit !== null) return { status: "law", fit };
  return { status: "no-law", missing: missing ?? "Runs with a rate are needed.", fit };
}

async function findRule(
  db: Kysely<Database>,
  sheet: Sheet,
  runs: readonly SheetRun[],
  readTrace: TraceReader,
): Promise<StudyRuleChoice | null> {
  const standing = runs.flatMap((run) => {
    const counted = run.setAside === null ? countedTrace(run) : null;
    return counted === null ? [] : [{ ...counted, signalSpan: signalSpan(sheet, run) }];
  });
  const surveys = await keepStage(db, surveyStage, standing, async ({ signalSpan: span, ...counted }) =>
    surveyed({
      label: counted.sha256,
      trace: await readTrace(counted),
      timeZero: counted.counts.timeZero,
      signalSpan: span,
    }),
  );
  return chooseFromSurveys(surveys);
}

/** What a rate depends on; equal inputs, equal rate, whatever run they belong to. */
interface RateInput extends CountedTrace {
  readonly options: InitialRateOptions;
}

async function findRates(
  db: Kysely<Database>,
  sheet: Sheet,
  runs: readonly SheetRun[],
  rule: StudyRuleChoice | null,
  readTrace: TraceReader,
): Promise<ReadonlyMap<string, RunRate>> {
  const rates = new Map<string, RunRate>();
  for (const run of runs)
    if (run.enteredRate !== null) rates.set(run.id, { kind: "entered", ...run.enteredRate });
  const traced = runs.flatMap((run) => {
    const counted = countedTrace(run);
    return counted === null ? [] : [{ run, counted }];
  });
  const inputs = traced.map(
    ({ run, counted }): RateInput => ({ ...counted, options: rateOptions(sheet, run, rule?.rule ?? null) }),
  );
  const estimates = await keepStage(db, rateStage, inputs, async ({ options, ...counted }) =>
    estimated(await readTrace(counted), options),
  );
  // A measured trace goes before a rate typed in by hand.
  for (const [index, { run }] of traced.entries()) {
    const estimate = estimates[index];
    if (estimate !== undefined) rates.set(run.id, rateOfReaction(sheet, run, estimate));
  }
  return rates;
}

/** What the analysis depends on; remarks, hazards, uploads and revision numbers are none of it. */
function whatCounts(sheet: Sheet): unknown {
  return {
    species: sheet.species,
    followedSpeciesId: sheet.followedSpeciesId,
    conditions: sheet.conditions,
    signal: sheet.signal,
    orders: sheet.orders,
    stocks: sheet.stocks,
    mixing: sheet.mixing,
    standards: sheet.standards.map(({ remark, ...standard }) => standard),
    calibration: sheet.calibration,
    runs: presentRuns(sheet).map(({ remark, changedIn, removedIn, trace, ...run }) => ({
      ...run,
      trace: trace?.sha256 ?? null,
    })),
  };
}
