import type { Flag } from "kinetics-core/quantities";
import type {
  Candidate,
  CandidateParameter,
  ExtensionFact,
  FittedCandidate,
  LackOfFitTest,
} from "./candidate";
import { STANDING_LEAD } from "./constants";
import { readingsOf } from "./readings";
import { type ResidualOrder, residualOrder } from "./residual-order";
import {
  holm,
  type LeaveOneOutOpinion,
  leaveOneOutOpinion,
  runLevelAicc,
  runLevelF,
} from "./run-level-statistics";
import { sentenceOf, verdictSentences } from "./sentences";

/**
 * Candidate rate laws side by side, on the level of runs: the same runs, the same weights, and the points of a trace
 * counted through their run alone. The rules and their constants stand in `constants.ts`; a verdict is a union that
 * knows that it may not know.
 */
export interface ComparisonInput {
  /** Label and common weight of every run, in the order of the candidates' residuals. */
  readonly runs: readonly { readonly label: string; readonly weight: number }[];
  readonly candidates: readonly Candidate[];
}

export type Reading =
  | "ruled-out"
  | "not-needed"
  | "standing"
  | "undecided"
  | "close"
  | "too-few-runs"
  | "not-compared";

export interface ComparedLaw {
  readonly id: string;
  readonly law: string;
  readonly reading: Reading;
  /** The reading with its reason. */
  readonly sentence: string;
  /** Run-level corrected Akaike criterion and its distance to the least of all. */
  readonly aicc: number | null;
  readonly deltaAicc: number | null;
  /** Against the law of least AICc; null for that law and for laws that fit better than it. */
  readonly fStatistic: number | null;
  readonly pValue: number | null;
  /** `pValue` times the number of laws with more parameters, by which the reading is taken. */
  readonly familyPValue: number | null;
  /** `pValue` adjusted by Holm over the candidates. */
  readonly holmPValue: number | null;
  readonly leaveOneOut: LeaveOneOutOpinion | null;
  /** Relative standard deviation of the runs about the law, as a part of v; null with no degree of freedom. */
  readonly residualScatter: number | null;
  readonly residualOrder: ResidualOrder;
  readonly lackOfFit: LackOfFitTest | null;
  readonly parameters: readonly CandidateParameter[];
  readonly atBound: readonly string[];
  readonly extensions: readonly ExtensionFact[];
}

export type Verdict =
  | { readonly kind: "standing"; readonly id: string }
  | { readonly kind: "undecided"; readonly between: readonly string[] }
  | { readonly kind: "none-adequate" }
  | { readonly kind: "too-few-runs" }
  | { readonly kind: "nothing-to-compare" };

export interface Comparison {
  /** In the order given. */
  readonly laws: readonly ComparedLaw[];
  readonly verdict: Verdict;
  /** Whether replicates tested that any law describes the runs at all. */
  readonly adequacy: "tested" | "not-tested";
  readonly sentences: readonly string[];
  readonly flags: readonly Flag[];
}

/** A law in the middle of its comparison. */
export interface JudgedLaw {
  readonly candidate: FittedCandidate;
  readonly aicc: number | null;
  readonly deltaAicc: number | null;
  readonly f: { readonly fStatistic: number; readonly pValue: number } | null;
  /** Compared laws with more parameters. */
  readonly richer: number;
  /** `pValue` times `richer` where that is above 1; at most 1. */
  readonly familyPValue: number | null;
}

export function compareLaws({ runs, candidates }: ComparisonInput): Comparison {
  const m = runs.length;
  const fitted = candidates.filter((one) => one.status === "fitted");
  const judged = judge(fitted, m);
  const best = judged.find((one) => one.deltaAicc === 0) ?? null;
  const readings = readingsOf(judged);
  const adjusted = holm(judged.map((one) => one.f?.pValue ?? null));
  const labels = runs.map((run) => run.label);
  const weights = runs.map((run) => run.weight);
  const bestErrors = best?.candidate.onRates?.leaveOneOut ?? null;
  const laws = candidates.map((candidate): ComparedLaw => {
    const place = candidate.status === "fitted" ? fitted.indexOf(candidate) : -1;
    const law = judged[place];
    if (candidate.status === "failed" || law === undefined) return notCompared(candidate);
    const reading = readings[place] ?? { reading: "not-compared", reasons: [] };
    const { onRates, parameters } = candidate;
    return {
      id: candidate.id,
      law: candidate.law,
      reading: reading.reading,
      sentence: sentenceOf(candidate.law, reading, m, parameters),
      aicc: law.aicc,
      deltaAicc: law.deltaAicc,
      fStatistic: law.f?.fStatistic ?? null,
      pValue: law.f?.pValue ?? null,
      familyPValue: law.familyPValue,
      holmPValue: adjusted[place] ?? null,
      leaveOneOut:
        onRates === null
          ? null
          : leaveOneOutOpinion(onRates.leaveOneOut, law === best ? null : bestErrors, weights),
      residualScatter: scatterOf(candidate, m),
      residualOrder:
        onRates === null ? { runsTest: null, durbinWatson: null } : residualOrder(onRates, labels, weights),
      lackOfFit: candidate.lackOfFit,
      parameters: candidate.estimates,
      atBound: candidate.estimates.filter((one) => one.atBound).map((one) => one.name),
      extensions: candidate.extensions,
    };
  });
  const verdict = verdictOf(laws);
  const tested = fitted.some((one) => one.lackOfFit !== null);
  const said = verdictSentences(verdict, laws, tested, STANDING_LEAD);
  return {
    laws,
    verdict,
    adequacy: tested ? "tested" : "not-tested",
    sentences: said.sentences,
    flags: said.flags,
  };
}

/** AICc, its distance to the least, and F against that law; ties go to fewer parameters, then to the name. */
function judge(fitted: readonly FittedCandidate[], runs: number): readonly JudgedLaw[] {
  const criteria = fitted.map(({ runSquares, parameters }) => runLevelAicc(runSquares, runs, parameters));
  let best = -1;
  criteria.forEach((criterion, i) => {
    if (criterion !== null && (best < 0 || isBetter(i, best))) best = i;
  });
  function isBetter(i: number, than: number): boolean {
    const lead = (criteria[than] ?? 0) - (criteria[i] ?? 0);
    if (lead !== 0) return lead > 0;
    const [one, other] = [fitted[i], fitted[than]];
    if (one === undefined || other === undefined) return false;
    return (
      one.parameters - other.parameters < 0 || (one.parameters === other.parameters && one.id < other.id)
    );
  }
  const bestLaw = fitted[best];
  return fitted.map((candidate, i) => {
    const aicc = criteria[i] ?? null;
    const compared = aicc !== null && bestLaw !== undefined;
    const f = compared && i !== best ? runLevelF(candidate.runSquares, bestLaw, runs) : null;
    const richer = fitted.filter(
      (other, k) => (criteria[k] ?? null) !== null && other.parameters > candidate.parameters,
    ).length;
    return {
      candidate,
      aicc,
      deltaAicc: compared ? aicc - (criteria[best] ?? 0) : null,
      f,
      richer,
      familyPValue: f === null ? null : Math.min(1, f.pValue * Math.max(1, richer)),
    };
  });
}

function scatterOf({ onRates, parameters }: FittedCandidate, runs: number): number | null {
  const freedom = runs - parameters;
  if (onRates === null || freedom < 1) return null;
  return Math.sqrt(onRates.residuals.reduce((sum, value) => sum + value ** 2, 0) / freedom);
}

function notCompared(candidate: Candidate): ComparedLaw {
  return {
    id: candidate.id,
    law: candidate.law,
    reading: "not-compared",
    sentence:
      `${candidate.law} could not be compared. ${candidate.status === "failed" ? candidate.message : ""}`.trim(),
    aicc: null,
    deltaAicc: null,
    fStatistic: null,
    pValue: null,
    familyPValue: null,
    holmPValue: null,
    leaveOneOut: null,
    residualScatter: null,
    residualOrder: { runsTest: null, durbinWatson: null },
    lackOfFit: null,
    parameters: [],
    atBound: [],
    extensions: [],
  };
}

function verdictOf(laws: readonly ComparedLaw[]): Verdict {
  const idsRead = (reading: Reading) => laws.filter((one) => one.reading === reading).map((one) => one.id);
  const [standing] = idsRead("standing");
  if (standing !== undefined) return { kind: "standing", id: standing };
  const between = idsRead("undecided");
  if (between.length > 0) return { kind: "undecided", between };
  if (idsRead("ruled-out").length > 0) return { kind: "none-adequate" };
  return idsRead("too-few-runs").length > 0 ? { kind: "too-few-runs" } : { kind: "nothing-to-compare" };
}
