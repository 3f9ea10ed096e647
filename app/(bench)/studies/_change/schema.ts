import { z } from "zod";

export const studyId = z.string().min(1).max(64);
/** The revision that the page showed when the change was made. */
export const base = z.number().int().nonnegative();

export const undoInput = z.object({ studyId, revision: z.number().int().positive() });
