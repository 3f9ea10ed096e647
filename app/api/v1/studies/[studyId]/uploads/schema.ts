import { z } from "zod";

/**
 * The query of an upload: the file's own name, as it is shown and as it comes back on download. A paste has none.
 */
export const uploadQuery = z.object({
  fileName: z
    .string()
    .trim()
    .min(1, "Give the name of the file as fileName.")
    .max(255, "The file name is longer than 255 characters.")
    .default("unnamed"),
});
