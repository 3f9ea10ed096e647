import { printNumber } from "kinetics-core/quantities";
import type { RateLawFit } from "kinetics-core/rate-law";
import type { Check } from "../analysis";
import { studyCheck } from "./check";
import type { Checked } from "./find-checks";

/**
 * Checks of the fitted law. What speaks against it is the library's to find and comes as its flags; what holds is
 * said here, so that a clean margin is a finding too.
 */
export function lawChecks({ law, runs }: Checked): readonly Check[] {
  const { fit } = law;
  if (fit === null) return [];
  const flagged = fit.flags
    .filter((flag) => !SAID_AT_THE_RUN.has(flag.code))
    .map((flag): Check => {
      const run = runs.find((one) => flag.message.startsWith(`${one.label} `));
      return { ...studyCheck("rate-law", flag.severity, flag.code, flag.message), runId: run?.runId ?? null };
    });
  return [...flagged, ...adequacy(fit), ...leaning(fit)];
}

/** Each run's own checks have said it already, with the way out. */
const SAID_AT_THE_RUN: ReadonlySet<string> = new Set(["rate-precision", "rate-not-positive"]);

function adequacy({ lackOfFit, flags }: RateLawFit): readonly Check[] {
  if (flags.some((flag) => flag.code === "lack-of-fit")) return [];
  if (lackOfFit === null)
    return [
      studyCheck(
        "rate-law",
        "note",
        "adequacy-not-tested",
        "The runs hold no repeats to test the law's adequacy by. Two or more runs of one recipe would test it.",
      ),
    ];
  return [
    studyCheck(
      "rate-law",
      "holds",
      "lack-of-fit",
      `The law misses the runs by no more than repeats differ among themselves (*p* = ${printNumber(lackOfFit.pValue, 2)}).`,
    ),
  ];
}

const LEANING: ReadonlySet<string> = new Set(["influential-run", "reading-on-one-run"]);

function leaning(fit: RateLawFit): readonly Check[] {
  const shift = largestShift(fit);
  if (shift === null || fit.flags.some((flag) => LEANING.has(flag.code))) return [];
  return [
    studyCheck(
      "rate-law",
      "holds",
      "influence",
      `The orders do not lean on one run: leaving out any single run moves none by more than ${shift.toPrecision(1)}.`,
    ),
  ];
}

/** The most that leaving out one run moves any free order; null where none is free or known. */
function largestShift(fit: RateLawFit): number | null {
  const shifts = fit.leaveOneOut.flatMap(({ orders }) =>
    Object.entries(orders).flatMap(([name, order]) => {
      const whole = fit.orders[name]?.estimate ?? null;
      return order === null || whole === null || order === whole ? [] : [Math.abs(order - whole)];
    }),
  );
  return shifts.length === 0 ? null : Math.max(...shifts);
}
