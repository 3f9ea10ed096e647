"use client";

import { useTransition } from "react";
import { Button, ButtonLink } from "@/app/_ui/button";
import { typeset } from "@/app/_ui/prose";
import { SectionTitle } from "@/app/_ui/sheet";
import type { useStudyChange } from "../../../_change/use-study-change";
import { followLine } from "../actions";
import type { FollowView } from "../view";
import type { StandardsTarget } from "./standards-sheet";

/** Whether the factor of the signal is the slope of this line, and the act that makes it so or parts them. */
export function FollowLine({
  target,
  follow,
  change,
  canEdit,
}: {
  target: StandardsTarget;
  follow: FollowView;
  change: ReturnType<typeof useStudyChange>;
  canEdit: boolean;
}) {
  const [working, start] = useTransition();
  const set = (wanted: boolean) =>
    start(async () => {
      change.report(await followLine({ ...target, follow: wanted }));
    });
  return (
    <section className="border-t-2 border-ink pt-3">
      <SectionTitle note="what the rates use">Signal</SectionTitle>
      <p>{typeset(follow.sentence)}</p>
      {canEdit && (
        <div className="mt-2.5">
          {follow.status === "typed" && (
            <Button disabled={working} onClick={() => set(true)}>
              Let the signal follow this line
            </Button>
          )}
          {follow.status === "follows" && (
            <Button size="small" disabled={working} onClick={() => set(false)}>
              Part the signal from the line
            </Button>
          )}
          {follow.status === "not-linear" && (
            <ButtonLink href={`/studies/${target.studyId}/set-up`}>Open the set-up</ButtonLink>
          )}
        </div>
      )}
    </section>
  );
}
