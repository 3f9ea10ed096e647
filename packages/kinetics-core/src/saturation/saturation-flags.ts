import { type Flag, numberInWords, percent } from "kinetics-core/quantities";
import type { Read, Reading } from "./fit-saturation";
import type { LackOfFit } from "./saturation";

/** Replicates that contradict the curve this strongly weaken every number of it (rules of candidate laws). */
const LACK_OF_FIT = 0.01;
/** With so few degrees of freedom an interval is wide for want of points and not of precision. */
const FEW_DEGREES_OF_FREEDOM = 2;

/** What a reader should beware of, worst first. */
export function saturationFlags(reading: Reading, lackOfFit: LackOfFit | null): Flag[] {
  return [
    ...shapeFlags(reading),
    ...uncertaintyFlags(reading),
    ...openEndFlags(reading),
    ...rangeFlags(reading),
    ...lackOfFitFlags(lackOfFit),
  ];
}

function shapeFlags({ shape, points, limiting }: Reading): Flag[] {
  const highest = numberInWords(Math.max(...points.concentrations));
  const lowest = numberInWords(Math.min(...points.concentrations.filter((c) => c > 0)));
  switch (shape) {
    case "straight":
      return [
        {
          code: "no-curvature",
          severity: "blocks",
          message: `The rates do not level off up to ${highest}: neither the limiting rate nor the half-saturation concentration can be given, only the slope. Measure at higher concentrations.`,
        },
      ];
    case "level":
      return [
        {
          code: "saturated-throughout",
          severity: "blocks",
          message: `The rates do not rise from ${lowest} on: the half-saturation concentration cannot be given, only the limiting rate${limiting === null ? "" : ` of ${numberInWords(limiting.estimate)}`}. Measure at lower concentrations.`,
        },
      ];
    case "unsettled":
      return [
        {
          code: "not-settled",
          severity: "blocks",
          message:
            "No saturation curve could be settled on. Check the units and look for a rate that does not belong to the others.",
        },
      ];
    case "curve":
      return [];
  }
}

function uncertaintyFlags({ isExact, points, solution }: Reading): Flag[] {
  const free = points.rates.length - 2;
  if (solution === null) return [];
  if (free === 0)
    return [
      {
        code: "no-degrees-of-freedom",
        severity: "weakens",
        message:
          "Two points fix the two numbers exactly, so no uncertainty can be given. Add at least one more.",
      },
    ];
  if (isExact)
    return [
      {
        code: "no-scatter",
        severity: "note",
        message: "The rates lie on the curve to their last digit, so no uncertainty can be read from them.",
      },
    ];
  if (free > FEW_DEGREES_OF_FREEDOM) return [];
  return [
    {
      code: "few-degrees-of-freedom",
      severity: "weakens",
      message: `The intervals rest on ${free} degree${free === 1 ? "" : "s"} of freedom; more points would narrow them most.`,
    },
  ];
}

function openEndFlags(reading: Reading): Flag[] {
  if (reading.shape !== "curve") return [];
  const named = [
    ["limiting-rate", "limiting rate", reading.limiting],
    ["half-saturation", "half-saturation concentration", reading.half],
  ] as const;
  return named.flatMap(([code, name, read]) => endFlags(code, name, read, reading.level));
}

function endFlags(code: string, name: string, read: Read | null, level: number): Flag[] {
  if (read === null || read.standardError === null) return [];
  const { profile } = read;
  const failed = profile === null || profile.low.kind === "failed" || profile.high.kind === "failed";
  if (failed)
    return [
      {
        code: `${code}-profile-failed`,
        severity: "weakens",
        message: `The profile of the ${name} could not be followed to its end, so it has no interval; its standard error stands for a first impression.`,
      },
    ];
  if (profile.interval !== null) return [];
  const { low, high } = profile;
  const known = high.at === null ? low.at : high.at;
  const side = high.at === null ? "above" : "below";
  return [
    {
      code: `${code}-open`,
      severity: "weakens",
      message: `At ${percent(level)} the data set no end to the ${name} ${side}${known === null ? "" : `; it is ${side === "above" ? "more" : "less"} than ${numberInWords(known)}`}. Measure at ${side === "above" ? "higher" : "lower"} concentrations.`,
    },
  ];
}

function rangeFlags({ points, half, shape }: Reading): Flag[] {
  const highest = Math.max(...points.concentrations);
  if (shape !== "curve" || half === null || highest >= half.estimate) return [];
  return [
    {
      code: "below-half-saturation",
      severity: "weakens",
      message: `Every concentration is below the half-saturation concentration (the highest is ${numberInWords(highest)}): the limiting rate is extrapolated. Measure beyond ${numberInWords(2 * half.estimate)}.`,
    },
  ];
}

function lackOfFitFlags(lackOfFit: LackOfFit | null): Flag[] {
  if (lackOfFit === null || lackOfFit.pValue >= LACK_OF_FIT) return [];
  return [
    {
      code: "lack-of-fit",
      severity: "weakens",
      message: `The rates miss the curve by more than their repeats scatter (p = ${numberInWords(lackOfFit.pValue)}): a law that saturates in another way may be needed.`,
    },
  ];
}
