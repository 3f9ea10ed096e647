import type { z } from "zod";
import { sheet } from "../sheet/sheet.schema";

/** What the Set-up station decides, in internal units. Whether a study is invented is not decided there. */
export const setUp = sheet
  .pick({ species: true, followedSpeciesId: true, conditions: true, signal: true })
  .extend({ study: sheet.shape.study.omit({ invented: true }) });

export type SetUp = z.infer<typeof setUp>;
