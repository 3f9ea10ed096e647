"use client";

import { useState } from "react";
import { Button } from "@/app/_ui/button";
import { Dialog } from "@/app/_ui/dialog";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import { useToast } from "@/app/_ui/toast";
import { revokeLink } from "../actions";
import type { LinkView } from "../view";

/** Links, newest first. Revoking asks once, works at once and keeps the row, struck through. */
export function LinkTable({
  studyId,
  links,
  canRevoke,
}: {
  studyId: string;
  links: readonly LinkView[];
  canRevoke: boolean;
}) {
  const [asking, setAsking] = useState<LinkView | null>(null);
  const [pending, setPending] = useState(false);
  const toast = useToast();

  async function revoke(link: LinkView) {
    setPending(true);
    const result = await revokeLink({ studyId, linkId: link.id });
    setPending(false);
    setAsking(null);
    toast(
      result.ok
        ? { text: `Link “${link.label}” revoked. It no longer opens.` }
        : { text: result.message, severity: "blocks" },
    );
  }

  return (
    <>
      <DataTable caption="Links to this study">
        <thead>
          <tr>
            <ColumnHead>For whom</ColumnHead>
            <ColumnHead>Shows</ColumnHead>
            <ColumnHead>Made</ColumnHead>
            <ColumnHead>Closes</ColumnHead>
            <ColumnHead>Last requested</ColumnHead>
            <ColumnHead>
              <span className="sr-only">Act</span>
            </ColumnHead>
          </tr>
        </thead>
        <tbody>
          {links.map((link) => (
            <tr key={link.id} className={link.state === "open" ? undefined : "text-ink-3"}>
              <td className={link.state === "revoked" ? "line-through" : undefined}>{link.label}</td>
              <td className="whitespace-nowrap">{link.shows}</td>
              <td className="whitespace-nowrap">{link.made}</td>
              <td className="whitespace-nowrap">
                {link.state === "expired" ? `closed ${link.closes}` : link.closes}
              </td>
              <td className="whitespace-nowrap">{link.lastRequested}</td>
              <td>
                {canRevoke && link.state === "open" && (
                  <Button size="small" onClick={() => setAsking(link)}>
                    Revoke link
                  </Button>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </DataTable>
      <Dialog
        open={asking !== null}
        onOpenChange={(open) => !open && setAsking(null)}
        title="Revoke this link?"
        lead={`“${asking?.label ?? ""}” stops opening at once, for everyone who has it. It cannot be opened again.`}
        actions={
          <>
            <Button onClick={() => setAsking(null)}>Keep the link</Button>
            <Button
              kind="primary"
              disabled={pending}
              onClick={() => {
                if (asking !== null) void revoke(asking);
              }}
            >
              {pending ? "Revoking" : "Revoke link"}
            </Button>
          </>
        }
      />
    </>
  );
}
