import { z } from "zod";
import { flag, moment } from "../column";

export const researchGroupRow = z.object({
  id: z.string(),
  name: z.string(),
  /** Fictional, made for demonstration; a server that others can reach refuses to open it. */
  invented: flag,
  created_at: moment,
});

export type ResearchGroupTable = z.infer<typeof researchGroupRow>;
