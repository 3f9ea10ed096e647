import { type Flag, inARow } from "kinetics-core/quantities";
import type { ComparedLaw, Verdict } from "./compare-laws";
import { SECOND_OPINION_T } from "./constants";
import type { ReadLaw, Reason } from "./readings";

/** One sentence for the reading of one law, with its reason and, where there is one, the way out. */
export function sentenceOf(
  law: string,
  { reading, reasons }: ReadLaw,
  runs: number,
  parameters: number,
): string {
  if (reading === "too-few-runs")
    return `${law}: ${runs} runs are too few to compare a law of ${parameters} ${parameters === 1 ? "parameter" : "parameters"}; ${parameters + 3} are needed.`;
  return `${law} is ${IN_WORDS[reading]}${reasons.length === 0 ? "" : `: ${inARow(reasons.map(reasonInWords))}`}.`;
}

const IN_WORDS = {
  "ruled-out": "ruled out",
  "not-needed": "not needed",
  standing: "standing",
  undecided: "undecided",
  close: "close",
  "not-compared": "not compared",
} as const;

function reasonInWords(reason: Reason): string {
  switch (reason.kind) {
    case "fits-worse":
      return `it fits the runs worse than ${reason.than} (${fInWords(reason.fStatistic)}, ${pInWords(reason.pValue)}${countedOver(reason.richer)}, AICc ${statistic(reason.deltaAicc)} higher)`;
    case "misses-replicates":
      return `it misses the runs by more than replicates differ among themselves (${fInWords(reason.fStatistic)}, ${pInWords(reason.pValue)})`;
    case "impossible-parameter":
      return `the whole interval of ${reason.parameter} lies beyond what it can be`;
    case "adds-nothing":
      return `what it adds to ${reason.to} by ${reason.parameter} cannot be told from nothing${reason.excludes === null ? "; how much it could add the runs do not say" : `; ${reason.excludes} is excluded`}`;
    case "lead":
      return `its AICc is ${statistic(reason.lead)} lower than that of the next, ${reason.over}`;
    case "only-one":
      return "no other law is left beside it";
    case "behind":
      return `its AICc is ${statistic(reason.by)} higher than that of ${reason.of}, not enough to rule it out`;
    case "level-with":
      return `the runs prefer neither it nor ${inARow(reason.others)} by enough`;
  }
}

/** The verdict in sentences, and what weakens it. */
export function verdictSentences(
  verdict: Verdict,
  laws: readonly ComparedLaw[],
  adequacyTested: boolean,
  lead: number,
): { readonly sentences: readonly string[]; readonly flags: readonly Flag[] } {
  const nameOf = (id: string) => laws.find((one) => one.id === id)?.law ?? id;
  const first = verdictInWords(verdict, nameOf, lead);
  const untested =
    adequacyTested || verdict.kind === "too-few-runs" || verdict.kind === "nothing-to-compare"
      ? []
      : [
          "Whether any of these laws describes the runs at all was not tested, since no recipe was repeated with runs to spare. Repeat two recipes.",
        ];
  return {
    sentences: [first, ...untested],
    flags: [
      ...untested.map((message): Flag => ({ code: "adequacy-not-tested", severity: "note", message })),
      ...(verdict.kind === "standing" ? secondOpinions(verdict.id, laws) : []),
      ...boundFlags(verdict, laws),
    ],
  };
}

function verdictInWords(verdict: Verdict, nameOf: (id: string) => string, lead: number): string {
  switch (verdict.kind) {
    case "standing":
      return `${nameOf(verdict.id)} stands.`;
    case "undecided":
      return `Undecided between ${inARow(verdict.between.map(nameOf))}: their AICc lie within ${lead}. Runs at which these laws foretell different rates would decide.`;
    case "none-adequate":
      return "None of the laws is adequate: each is ruled out by the runs. Another form of law, or an influence that was not recorded, is behind the rates.";
    case "too-few-runs":
      return "There are too few runs to compare the laws.";
    case "nothing-to-compare":
      return "No law could be fitted, so there is nothing to compare.";
  }
}

/** Laws that foretell left-out runs better than the standing one. */
function secondOpinions(standing: string, laws: readonly ComparedLaw[]): readonly Flag[] {
  const own = laws.find((one) => one.id === standing);
  const t = own?.leaveOneOut?.pairedT ?? null;
  if (own === undefined || t === null || t <= SECOND_OPINION_T) return [];
  return [
    {
      code: "second-opinion",
      severity: "weakens",
      message: `Left-out runs are foretold worse by ${own.law} than by the law of least AICc (paired t = ${statistic(t)}). More runs would settle it.`,
    },
  ];
}

function boundFlags(verdict: Verdict, laws: readonly ComparedLaw[]): readonly Flag[] {
  const named =
    verdict.kind === "standing" ? [verdict.id] : verdict.kind === "undecided" ? verdict.between : [];
  return laws
    .filter((one) => named.includes(one.id) && one.atBound.length > 0)
    .map((one) => ({
      code: "parameter-at-bound",
      severity: "weakens",
      message: `In ${one.law} ${inARow(one.atBound)} ${one.atBound.length === 1 ? "rests" : "rest"} on the end of what was allowed, so its estimate is a limit and no value. A simpler law, or runs where it matters more, would settle it.`,
    }));
}

function statistic(value: number): string {
  return value >= 1000 ? "over 1000" : value.toFixed(1);
}

function fInWords(value: number): string {
  return value >= 1000 ? "F over 1000" : `F = ${statistic(value)}`;
}

/** The best of several richer laws fits better by chance more often than one. */
function countedOver(richer: number): string {
  return richer > 1 ? ` counted over ${richer} laws with more parameters` : "";
}

function pInWords(pValue: number): string {
  return pValue < 0.0001 ? "p < 0.0001" : `p = ${pValue.toPrecision(2)}`;
}
