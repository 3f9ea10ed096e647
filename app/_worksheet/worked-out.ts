import type { Sheet } from "@/db/sheet/sheet.schema";
import { remixed } from "./mixing/remixed";
import { recalibrated } from "./standards/recalibrated";

/**
 * The sheet with everything that follows from the rest of it worked out anew: the signal's factor from the standards,
 * concentrations from stocks and volumes. Commands that bring back or save whole parts of a sheet take it along, so that
 * what follows changes with what it follows from, in one revision. Applied again it changes nothing.
 */
export function workedOut(sheet: Sheet): Sheet {
  return remixed(recalibrated(sheet));
}
