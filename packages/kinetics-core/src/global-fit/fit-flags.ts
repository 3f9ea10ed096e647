import type { Flag } from "kinetics-core/quantities";
import type { FittedStudy } from "./fitted-study";
import type { GlobalFitInput } from "./global-fit";
import { scalePlace } from "./prepared-study";
import { ownAutocorrelation } from "./reading-noise";

/** Above this autocorrelation few independent readings stand behind a trace; the constant of the initial rates. */
const HIGH_AUTOCORRELATION = 0.9;
/** Standard uncertainties by which the traces may pull ε·l from its stated value before that is said. */
const PULLED = 2;

/** What a reader of the fit should beware of. */
export function fitFlags(input: GlobalFitInput, fitted: FittedStudy): readonly Flag[] {
  return [
    ...fitted.inference.flags,
    ...boundFlags(fitted),
    ...runFlags(fitted),
    ...scaleFlags(input, fitted),
    ...endFlags(input, fitted),
  ];
}

function boundFlags({ atBound }: FittedStudy): Flag[] {
  return atBound.map((name) => ({
    code: "at-bound",
    severity: "blocks",
    message: `${name} rests on the bound of what is accepted, so its interval means nothing. Hold it or choose another law.`,
  }));
}

function runFlags({ pass, study }: FittedStudy): Flag[] {
  const silent = study.runs.flatMap(({ label }, j) => ((pass.runs[j]?.gram[0] ?? 0) > 0 ? [] : [label]));
  const smooth = study.runs.flatMap(({ label }, j) => {
    const run = pass.runs[j];
    return run !== undefined && ownAutocorrelation(run) > HIGH_AUTOCORRELATION ? [label] : [];
  });
  const flags: Flag[] = [];
  if (silent.length > 0)
    flags.push({
      code: "run-without-rate",
      severity: "weakens",
      message: `${silent.join(", ")}: the reaction is over at the first reading or never begins, so nothing is learnt of its rate. Read earlier or set the run aside.`,
    });
  if (smooth.length > 0)
    flags.push({
      code: "high-autocorrelation",
      severity: "weakens",
      message: `${smooth.join(", ")}: neighbouring residuals go together (ρ above ${HIGH_AUTOCORRELATION}), as they do where the law misses the shape of the trace or the signal drifts.`,
    });
  return flags;
}

function scaleFlags({ signalPerConcentration }: GlobalFitInput, { theta, study }: FittedStudy): Flag[] {
  const place = scalePlace(study);
  if (place < 0) return [];
  const pulled = ((theta[place] ?? 1) - 1) / Math.sqrt(study.scaleVariance);
  if (Math.abs(pulled) <= PULLED) return [];
  return [
    {
      code: "scale-pulled",
      severity: "weakens",
      message: `The traces want a signal per concentration ${Math.abs(pulled).toFixed(1)} standard uncertainties ${pulled > 0 ? "above" : "below"} the stated ${signalPerConcentration.value}. Check the calibration, the starting concentrations or the law.`,
    },
  ];
}

function endFlags({ runs }: GlobalFitInput, { study }: FittedStudy): Flag[] {
  const unused = runs.filter(
    (run, j) =>
      run.endSignal !== undefined &&
      (study.law.sensitivity === "variation" || study.runs[j]?.most === Number.MAX_VALUE),
  );
  if (unused.length === 0) return [];
  return [
    {
      code: "end-signal-unused",
      severity: "note",
      message: `The end signal of ${unused.map(({ label }) => label).join(", ")} was not used: this law ends at no fixed extent. Give the end reading as the last point of the trace.`,
    },
  ];
}
