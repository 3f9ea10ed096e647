import { SHEET_VERSION } from "./sheet.schema";
import { NO_PREPARATION, UNSAID_CONDITIONS, UNSAID_RUN, UNSAID_SIGNAL } from "./unsaid";

/**
 * A sheet as an earlier version of the product kept it, in the shape of today: what could not be said then is what it
 * meant by not being there. Revisions are never rewritten, so that their hashes hold; they are read through this.
 */
export function upgradeSheet(kept: unknown): unknown {
  return isVersion(kept, 1) ? { ...kept, ...preparationOf(kept), version: SHEET_VERSION } : kept;
}

/** Version 1 knew no stocks, no standards and no marks on a trace. */
function preparationOf(kept: Readonly<Record<string, unknown>>) {
  const runs = Array.isArray(kept.runs) ? kept.runs : [];
  return {
    conditions: {
      ...objectOf(kept.conditions),
      ...UNSAID_CONDITIONS,
    },
    signal: isCalibrated(kept.signal) ? { ...kept.signal, ...UNSAID_SIGNAL } : kept.signal,
    ...NO_PREPARATION,
    runs: runs.map((run: unknown) => ({ ...objectOf(run), ...UNSAID_RUN })),
  };
}

function isVersion(kept: unknown, version: number): kept is Readonly<Record<string, unknown>> {
  return typeof kept === "object" && kept !== null && "version" in kept && kept.version === version;
}

function isCalibrated(signal: unknown): signal is Readonly<Record<string, unknown>> {
  return typeof signal === "object" && signal !== null && "kind" in signal && signal.kind === "calibrated";
}

function objectOf(value: unknown): Readonly<Record<string, unknown>> {
  return typeof value === "object" && value !== null ? { ...value } : {};
}
