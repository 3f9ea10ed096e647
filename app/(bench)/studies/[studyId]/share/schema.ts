import { z } from "zod";

const identifier = z.string().min(1).max(64);

/** How long a link works. A link that never closes is a choice that somebody has to make, not the default. */
export const LINK_LIVES = {
  "7": "7 days",
  "30": "30 days",
  "90": "90 days",
  "365": "a year",
  never: "until it is revoked",
} as const;

export const newLinkForm = z.object({
  studyId: identifier,
  label: z.string().trim().max(120, "Keep the note under 120 characters."),
  life: z.enum(["7", "30", "90", "365", "never"]),
  shows: z.enum(["live", "frozen"]),
  /** The revision that the person saw when choosing "frozen". */
  revision: z.number().int().positive(),
});

export const revokeForm = z.object({ studyId: identifier, linkId: identifier });
