import type { StudyRuleChoice } from "kinetics-core/initial-rate";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { Check, CheckSeverity, LawAnalysis, RunAnalysis } from "../analysis";
import type { CarryingRun } from "../law-input";
import { blockChecks } from "./block-checks";
import { designChecks } from "./design-checks";
import { ionicStrengthChecks } from "./ionic-strength-checks";
import { lawChecks } from "./law-checks";
import { rateChecks } from "./rate-checks";
import { setUpChecks } from "./set-up-checks";
import { standardsChecks } from "./standards-checks";
import { temperatureChecks } from "./temperature-checks";
import { traceChecks } from "./trace-checks";

/** What the checks look at: the sheet with everything that was made of it. */
export interface Checked {
  readonly sheet: Sheet;
  readonly rule: StudyRuleChoice | null;
  readonly runs: readonly RunAnalysis[];
  readonly carrying: readonly CarryingRun[];
  readonly law: LawAnalysis;
}

/** All checks, worst first; settled ones last. Within one severity they keep the order of the stations. */
export function findChecks(checked: Checked): readonly Check[] {
  return [
    ...setUpChecks(checked),
    ...standardsChecks(checked),
    ...temperatureChecks(checked),
    ...ionicStrengthChecks(checked),
    ...blockChecks(checked),
    ...rateChecks(checked),
    ...traceChecks(checked),
    ...designChecks(checked),
    ...lawChecks(checked),
  ].sort((a, b) => weight(a) - weight(b));
}

const ORDER: readonly CheckSeverity[] = ["blocks", "weakens", "note", "holds"];

function weight(check: Check): number {
  return ORDER.indexOf(check.severity) + (check.settled === null ? 0 : ORDER.length);
}
