import "server-only";
import { notFound } from "next/navigation";
import type { ChangeResult } from "@/db/study/change-study";
import { type ActionResult, done, refused } from "./action-result";

/** What a page needs to know of a change that went through: `revision` is null where it changed nothing. */
export interface Changed {
  readonly revision: number | null;
  /** One sentence for the toast, the same that the history keeps. */
  readonly summary: string;
}

/**
 * The outcome of a command as an action gives it back: conflicts and refusals are sentences, another group's study
 * is the same 404 as one that does not exist.
 */
export function changeOutcome(result: ChangeResult): ActionResult<Changed> {
  switch (result.status) {
    case "changed":
      return done({ revision: result.revision, summary: result.summary });
    case "unchanged":
      return done({ revision: null, summary: "Nothing to change." });
    case "conflict":
    case "refused":
      return refused(result.message);
    case "forbidden":
      return refused("Only analysts and leads can change a study. Nothing was changed.");
    case "not-found":
      return notFound();
  }
}
