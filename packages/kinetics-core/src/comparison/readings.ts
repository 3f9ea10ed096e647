import type { JudgedLaw, Reading } from "./compare-laws";
import { LACK_OF_FIT_P_VALUE, RULED_OUT_LEAD, RULED_OUT_P_VALUE, STANDING_LEAD } from "./constants";

/** Why a law is read as it is. */
export type Reason =
  | {
      readonly kind: "fits-worse";
      readonly than: string;
      readonly fStatistic: number;
      /** Times the number of richer laws. */
      readonly pValue: number;
      readonly richer: number;
      readonly deltaAicc: number;
    }
  | { readonly kind: "misses-replicates"; readonly fStatistic: number; readonly pValue: number }
  | { readonly kind: "impossible-parameter"; readonly parameter: string }
  | {
      readonly kind: "adds-nothing";
      readonly to: string;
      readonly parameter: string;
      readonly excludes: string | null;
    }
  | { readonly kind: "lead"; readonly lead: number; readonly over: string }
  | { readonly kind: "only-one" }
  | { readonly kind: "behind"; readonly by: number; readonly of: string }
  | { readonly kind: "level-with"; readonly others: readonly string[] };

export interface ReadLaw {
  readonly reading: Reading;
  readonly reasons: readonly Reason[];
}

/** Reading of each judged law, in their order. Ruled out goes before not needed, that before the rest. */
export function readingsOf(judged: readonly JudgedLaw[]): readonly ReadLaw[] {
  const best = judged.find((one) => one.deltaAicc === 0);
  const against = judged.map((law) => (law.aicc === null ? [] : reasonsAgainst(law, best)));
  const alive = judged.filter((law, i) => law.aicc !== null && against[i]?.length === 0);
  const idle = judged.map((law) => (alive.includes(law) ? addsNothing(law, alive) : null));
  const rest = judged
    .filter((law, i) => alive.includes(law) && idle[i] === null)
    .sort((a, b) => (a.aicc ?? 0) - (b.aicc ?? 0) || compareIds(a, b));
  return judged.map((law, i): ReadLaw => {
    if (law.aicc === null) return { reading: "too-few-runs", reasons: [] };
    const reasons = against[i] ?? [];
    if (reasons.length > 0) return { reading: "ruled-out", reasons };
    const needless = idle[i] ?? null;
    if (needless !== null) return { reading: "not-needed", reasons: [needless] };
    return placeAmong(law, rest);
  });
}

function reasonsAgainst(
  { candidate, deltaAicc, f, richer, familyPValue }: JudgedLaw,
  best: JudgedLaw | undefined,
): Reason[] {
  const reasons: Reason[] = [];
  if (
    f !== null &&
    best !== undefined &&
    familyPValue !== null &&
    familyPValue < RULED_OUT_P_VALUE &&
    deltaAicc !== null &&
    deltaAicc >= RULED_OUT_LEAD
  )
    reasons.push({
      kind: "fits-worse",
      than: best.candidate.law,
      fStatistic: f.fStatistic,
      pValue: familyPValue,
      richer,
      deltaAicc,
    });
  const { lackOfFit } = candidate;
  if (lackOfFit !== null && lackOfFit.pValue < LACK_OF_FIT_P_VALUE)
    reasons.push({
      kind: "misses-replicates",
      fStatistic: lackOfFit.fStatistic,
      pValue: lackOfFit.pValue,
    });
  for (const { name, impossible } of candidate.estimates)
    if (impossible) reasons.push({ kind: "impossible-parameter", parameter: name });
  return reasons;
}

/** Only a simpler law that is itself among those left makes an extension idle. */
function addsNothing({ candidate }: JudgedLaw, alive: readonly JudgedLaw[]): Reason | null {
  for (const { law, coversNull, parameter, excludes } of candidate.extensions) {
    if (!coversNull) continue;
    if (alive.some((other) => other.candidate !== candidate && other.candidate.law === law))
      return { kind: "adds-nothing", to: law, parameter, excludes };
  }
  return null;
}

/** `rest`: least AICc first. */
function placeAmong(law: JudgedLaw, rest: readonly JudgedLaw[]): ReadLaw {
  const first = rest[0];
  const second = rest[1];
  if (first === undefined || law.aicc === null || first.aicc === null)
    return { reading: "not-compared", reasons: [] };
  if (second === undefined) return { reading: "standing", reasons: [{ kind: "only-one" }] };
  const level = rest.filter((one) => (one.aicc ?? 0) - (first.aicc ?? 0) < STANDING_LEAD);
  if (level.length === 1 && law === first)
    return {
      reading: "standing",
      reasons: [{ kind: "lead", lead: (second.aicc ?? 0) - first.aicc, over: second.candidate.law }],
    };
  if (level.length > 1 && level.includes(law))
    return {
      reading: "undecided",
      reasons: [
        { kind: "level-with", others: level.filter((one) => one !== law).map((one) => one.candidate.law) },
      ],
    };
  return {
    reading: "close",
    reasons: [{ kind: "behind", by: law.aicc - first.aicc, of: first.candidate.law }],
  };
}

function compareIds(a: JudgedLaw, b: JudgedLaw): number {
  return a.candidate.id < b.candidate.id ? -1 : 1;
}
