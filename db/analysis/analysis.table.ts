import { z } from "zod";
import { moment } from "../column";

/** A computed result. `hash` covers its inputs and the core's version; the row may vanish at any time. */
export const analysisRow = z.object({
  hash: z.string(),
  kind: z.string(),
  core_version: z.string(),
  json: z.string(),
  bytes: z.number(),
  last_used_at: moment,
});

export type AnalysisTable = z.infer<typeof analysisRow>;
