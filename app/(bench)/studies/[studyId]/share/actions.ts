"use server";

import { revalidatePath } from "next/cache";
import { notFound } from "next/navigation";
import { done, refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import { createShareLink, revokeShareLink } from "@/db/share-link/share-link.commands";
import { newLinkForm, revokeForm } from "./schema";

const DAY_MILLISECONDS = 86_400_000;

/** Makes a link and gives back its path, the only time that the token is seen. */
export const makeLink = memberAction(newLinkForm, "analyst", async ({ actor, input, db }) => {
  const expiresAt =
    input.life === "never" ? null : new Date(Date.now() + Number(input.life) * DAY_MILLISECONDS);
  const result = await createShareLink(db, actor, {
    studyId: input.studyId,
    label: input.label,
    expiresAt,
    frozenRevision: input.shows === "frozen" ? input.revision : null,
  });
  switch (result.status) {
    case "created":
      revalidatePath(`/studies/${input.studyId}/share`);
      return done({ path: `/share/${result.token}` });
    case "refused":
      return refused(result.message);
    case "forbidden":
      return refused("Only analysts and leads make links. No link was made.");
    case "not-found":
      return notFound();
  }
});

/** Works at once; the row stays, struck through. */
export const revokeLink = memberAction(revokeForm, "analyst", async ({ actor, input, db }) => {
  const result = await revokeShareLink(db, actor, input.linkId);
  switch (result.status) {
    case "revoked":
      revalidatePath(`/studies/${input.studyId}/share`);
      return done(null);
    case "forbidden":
      return refused("Only analysts and leads revoke links. The link still works.");
    case "not-found":
      return notFound();
  }
});
