import { z } from "zod";
import { base, studyId } from "../../_change/schema";

const runId = z.string().min(1).max(64);
const runIds = z.array(runId).min(1, "Select runs first.").max(2000);

export const runsInput = z.object({ studyId, base, runIds });

export const setAsideInput = runsInput.extend({
  reason: z
    .string()
    .trim()
    .min(1, "A run is set aside with a reason. Say in a few words what was wrong.")
    .max(300, "A reason has at most 300 characters."),
});

export const previewInput = z.object({ studyId, runIds, aside: z.boolean() });

export const recipeInput = z.object({ studyId, base, runId });

/** Texts of the cells that changed, by column; a run that is new has no id yet and a key of the page's own. */
export const rowEdit = z.object({
  key: z.string().min(1).max(80),
  runId: runId.nullable(),
  cells: z.record(z.string().max(80), z.string().max(400)),
});

export const rowsInput = z.object({ studyId, base, rows: z.array(rowEdit).min(1).max(2000) });

export type RowEdit = z.infer<typeof rowEdit>;
