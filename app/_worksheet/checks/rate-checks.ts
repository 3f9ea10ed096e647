import type { Check } from "../analysis";
import { judgesNoise } from "../judges-noise";
import { lawSpecies, presentRuns } from "../present-runs";
import { percent, studyCheck } from "./check";
import type { Checked } from "./find-checks";

/** A run that ends at less than this part of the rule's conversion is named. */
const REACHED_PART = 0.9;

/** The library's notes that many runs of one instrument share. */
const FLAGS_OF_SEVERAL: Readonly<Record<string, string>> = {
  "before-mixing": "their readings before mixing are not used.",
};

/** Findings that take the noise as judged. */
const ON_NOISE: ReadonlySet<string> = new Set(["autocorrelated", "few-effective-points"]);

/**
 * Checks of each run's rate: whether there is one, whether it has a logarithm, what the library says about its
 * estimate. Those of a run set aside are settled by its reason.
 */
export function rateChecks({ sheet, rule, runs }: Checked): readonly Check[] {
  const rows = new Map(presentRuns(sheet).map((run) => [run.id, run]));
  const checks: Check[] = [];
  for (const analysed of runs) {
    const run = rows.get(analysed.runId);
    if (run === undefined) continue;
    const settled = run.setAside === null ? null : `Set aside: ${run.setAside.reason}`;
    const add = (
      severity: Check["severity"],
      code: string,
      message: string,
      { station = "rates", ofSeveral }: { station?: Check["station"]; ofSeveral?: string | undefined } = {},
    ) =>
      checks.push({
        code,
        severity,
        station,
        runId: run.id,
        message: `${run.label}: ${message}`,
        settled,
        ...(ofSeveral === undefined ? {} : { ofSeveral }),
      });

    const { rate } = analysed;
    if (run.trace !== null && run.enteredRate !== null)
      add(
        "note",
        "entered-rate-unused",
        "its rate is read from its trace; the rate entered by hand is kept and does not count.",
        {
          ofSeveral:
            "their rates are read from their traces; the rates entered by hand are kept and do not count.",
        },
      );
    if (rate.kind === "none") {
      if (run.trace === null)
        add("note", "no-rate", lowered(rate.reason), {
          station: "runs",
          ofSeveral:
            "they have neither traces nor entered rates. Import their traces or enter their rates on Runs.",
        });
      else add("blocks", "no-rate", lowered(rate.reason));
      continue;
    }
    if (rate.molarPerSecond <= 0)
      add(
        "blocks",
        "rate-not-positive",
        `the initial rate is ${rate.molarPerSecond === 0 ? "zero" : "negative"}, and a law of powers has no place for it. Check the sign of the signal and the window, or set the run aside.`,
      );
    const absent = lawSpecies(sheet).filter((one) => !((run.concentrations[one.id]?.molar ?? 0) > 0));
    if (absent.length > 0)
      add(
        "note",
        "species-absent",
        `it holds no ${absent.map((one) => one.symbol || one.name).join(" and no ")}, so that it cannot carry a law of powers. It may serve as a blank.`,
        {
          station: "runs",
          ofSeveral:
            "they lack a species of the law, so that they cannot carry a law of powers. They may serve as blanks.",
        },
      );
    if (rate.kind === "entered") continue;
    const noiseJudged = judgesNoise(rate.initialRate);
    if (!noiseJudged)
      add(
        "weakens",
        "few-effective-points",
        "it has too few readings to judge its noise, so that its uncertainty is a rule of thumb. Read the run more densely, or for longer.",
      );
    for (const flag of rate.initialRate.flags)
      if (noiseJudged || !ON_NOISE.has(flag.code))
        add(flag.severity, flag.code, lowered(flag.message), { ofSeveral: FLAGS_OF_SEVERAL[flag.code] });
    const { conversion } = rate.initialRate;
    if (
      rule !== null &&
      !rate.byHand &&
      conversion !== null &&
      conversion < REACHED_PART * rule.rule.conversionEnd
    )
      add(
        "note",
        "conversion-short",
        `its window ends at ${percent(conversion)} conversion, before the ${percent(rule.rule.conversionEnd)} of the study's rule.`,
        {
          ofSeveral: `their windows end before the ${percent(rule.rule.conversionEnd)} conversion of the study's rule.`,
        },
      );
    if (rate.byHand)
      add("note", "window-by-hand", "its window was set by hand and does not follow the study's rule.", {
        ofSeveral: "their windows were set by hand and do not follow the study's rule.",
      });
  }
  if (rule !== null && runs.some((run) => run.rate.kind === "estimated") && !checks.some(concernsConversion))
    checks.push(
      studyCheck(
        "rates",
        "holds",
        "conversion-shared",
        `Every window ends at the same conversion, ${percent(rule.rule.conversionEnd)}, whatever the run's speed.`,
      ),
    );
  return checks;
}

function concernsConversion(check: Check): boolean {
  return (
    check.settled === null &&
    ["conversion-short", "window-by-hand", "conversion-unknown"].includes(check.code)
  );
}

/** The sentence as it goes on after "R03: ". Symbols keep their capital. */
function lowered(sentence: string): string {
  return /^[A-Z][a-z]/.test(sentence) ? sentence.charAt(0).toLowerCase() + sentence.slice(1) : sentence;
}
