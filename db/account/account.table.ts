import { z } from "zod";
import { moment } from "../column";

export const accountRow = z.object({
  id: z.string(),
  /** Lower case. */
  email: z.string(),
  name: z.string(),
  initials: z.string(),
  /** argon2id in PHC format. */
  password_hash: z.string(),
  created_at: moment,
});

export type AccountTable = z.infer<typeof accountRow>;
