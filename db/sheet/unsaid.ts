import type { Conditions, Sheet, SheetRun, SignalModel } from "./sheet.schema";

/** Parts of a sheet before anybody has said anything about them. */

/** No stocks, no standards; mixtures are not made up to a mark. */
export const NO_PREPARATION: Pick<Sheet, "stocks" | "mixing" | "standards" | "calibration" | "scans"> = {
  stocks: [],
  mixing: { volumeUnit: "uL", markMicrolitre: null, deliveries: [] },
  standards: [],
  calibration: {
    speciesId: null,
    intercept: "fitted",
    weighting: "none",
    rangeMolar: null,
    stockRelative: 0,
  },
  scans: [],
};

export const UNSAID_CONDITIONS: Pick<
  Conditions,
  "activationEnergy" | "referenceIonicStrengthMolar" | "sampleIntervalSeconds"
> = { activationEnergy: null, referenceIonicStrengthMolar: null, sampleIntervalSeconds: null };

export const UNSAID_SIGNAL: Pick<Extract<SignalModel, { kind: "calibrated" }>, "blank" | "source"> = {
  blank: null,
  source: "typed",
};

/** Concentrations were typed and the trace is taken as it came. */
export const UNSAID_RUN: Pick<
  SheetRun,
  "volumes" | "markMicrolitre" | "deadTimeSeconds" | "trim" | "spikes" | "endSignal"
> = { volumes: {}, markMicrolitre: null, deadTimeSeconds: 0, trim: null, spikes: [], endSignal: null };
