import type { Kysely } from "kysely";
import { canonicalJson, sha256Of } from "@/db/canonical-json";
import type { Database } from "@/db/database";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";
import type { RunAnalysis, RunRate, StudyAnalysis } from "./analysis";
import { CORE_VERSION } from "./core-version";
import type { CarryingRun } from "./law-input";
import { missingForLaw } from "./missing-law";
import { lawSpecies, presentRuns } from "./present-runs";
import { RecentResults } from "./recent-results";
import { runMarks } from "./run-marks";

/**
 * The sheet's analysis, in stages that are each kept under the hash of what they depend on:
 *
 *   traces of the standing runs → the study's rule → each run's rate → the law → the checks
 *
 * The first two read traces and are also kept in the database; the law and its checks take a millisecond or two
 * and are made afresh, so that setting a run aside costs one fit. The study's rule is chosen from standing runs
 * alone, since a faulty trace must not choose the window of the others; the runs set aside are then measured by
 * the same rule, and carry nothing.
 */
export async function analyseStudy(_db: Kysely<Database>, sheet: Sheet): Promise<StudyAnalysis> {
  const hash = sha256Of(canonicalJson([CORE_VERSION, whatCounts(sheet)]));
  return recentAnalyses.get(hash, () => analyse(sheet, hash));
}

/** Enough for every study that a group has open at once; one analysis of 300 runs is about half a megabyte. */
const recentAnalyses = new RecentResults<StudyAnalysis>(64);

async function analyse(sheet: Sheet, hash: string): Promise<StudyAnalysis> {
  const runs = presentRuns(sheet);
  const marks = runMarks(sheet);
  const analysed = runs.map((run): RunAnalysis => {
    const rate: RunRate = run.enteredRate === null ? NOT_MEASURED : { kind: "entered", ...run.enteredRate };
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
  const missing = missingForLaw(sheet, carrying, null) ?? "Runs with a rate are needed.";
  return { hash, rule: null, runs: analysed, law: { status: "no-law", missing, fit: null }, checks: [] };
}

const NOT_MEASURED: RunRate = {
  kind: "none",
  reason: "It has neither a trace nor an entered rate. Import its trace or enter its rate on Runs.",
};

/** Whether a run's logarithms exist: a positive rate and a positive concentration of every species of the law. */
function canCarry(sheet: Sheet, run: SheetRun, rate: RunRate): boolean {
  return (
    rate.kind !== "none" &&
    rate.molarPerSecond > 0 &&
    lawSpecies(sheet).every((species) => (run.concentrations[species.id]?.molar ?? 0) > 0)
  );
}

/** What the analysis depends on; remarks, hazards, uploads and revision numbers are none of it. */
function whatCounts(sheet: Sheet): unknown {
  return {
    species: sheet.species,
    followedSpeciesId: sheet.followedSpeciesId,
    conditions: sheet.conditions,
    signal: sheet.signal,
    orders: sheet.orders,
    runs: presentRuns(sheet).map(({ remark, changedIn, removedIn, trace, ...run }) => ({
      ...run,
      trace: trace?.sha256 ?? null,
    })),
  };
}
