import { calibratedSpecies } from "@/app/_worksheet/standards/calibrated-species";
import { readStandardLines } from "@/app/_worksheet/standards/standard-lines";
import type { ConcentrationUnit, Sheet, SheetStandard } from "@/db/sheet/sheet.schema";
import type { Refusal } from "@/db/study/change-study";
import type { ReadSettings } from "./read-settings";

/** What the station changes, sheet to sheet; what follows from it is worked out by the change itself. */

/** The standards as the lines say: known labels keep their ids, the others leave. `lines` were found readable. */
export function withLines(
  sheet: Sheet,
  lines: string,
  unit: ConcentrationUnit,
  newId: () => string,
): Sheet | Refusal {
  const read = readStandardLines(lines, unit, sheet.standards, newId);
  if (read.status === "faults") return { refused: read.faults.map(({ message }) => message).join(" ") };
  return { ...sheet, standards: [...read.standards] };
}

/** How the line is drawn. An end of the range that was left open lies at 0, or at the highest standard. */
export function withSettings(
  sheet: Sheet,
  speciesId: string,
  { low, high, ...settings }: Extract<ReadSettings, { status: "read" }>["settings"],
): Sheet {
  const highest = Math.max(0, ...sheet.standards.map(({ concentration }) => concentration.value));
  return {
    ...sheet,
    calibration: {
      ...settings,
      speciesId: sheet.species.some(({ id }) => id === speciesId) ? speciesId : null,
      rangeMolar: low === null && high === null ? null : { low: low ?? 0, high: high ?? highest },
    },
  };
}

/** The signal follows the line, or keeps the factor as it stands, typed from then on. */
export function withFollowing(sheet: Sheet, follow: boolean): Sheet | Refusal {
  if (sheet.signal?.kind !== "calibrated")
    return {
      refused: "The set-up does not say that the signal is linear in a concentration. Say so there first.",
    };
  const followed = sheet.species.find(({ id }) => id === sheet.followedSpeciesId);
  if (follow && calibratedSpecies(sheet)?.id !== followed?.id)
    return {
      refused: `The standards are not of ${followed?.name || "the followed species"}. Follow the species that they contain, or correct what they contain.`,
    };
  return { ...sheet, signal: { ...sheet.signal, source: follow ? "standards" : "typed" } };
}

export function withAside(
  sheet: Sheet,
  standardId: string,
  setAside: SheetStandard["setAside"],
): Sheet | Refusal {
  if (!sheet.standards.some(({ id }) => id === standardId))
    return { refused: "The standard is not on the sheet any more. Load the page again." };
  return {
    ...sheet,
    standards: sheet.standards.map((one) => (one.id === standardId ? { ...one, setAside } : one)),
  };
}
