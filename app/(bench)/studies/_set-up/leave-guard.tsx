"use client";

import { useRouter } from "next/navigation";
import { useEffect, useState } from "react";
import { Button } from "@/app/_ui/button";
import { Dialog } from "@/app/_ui/dialog";
import { leavingAddress } from "./leaving-link";

/**
 * Asks before boxes that were changed and not kept are lost: by a link of the site, whoever drew it, or by closing
 * the tab. The router has no way to hold a link back, so that clicks are caught before they reach it.
 */
export function LeaveGuard({ onKeep }: { onKeep: () => void }) {
  const router = useRouter();
  const [wanted, setWanted] = useState<string | null>(null);

  useEffect(() => {
    function catchLink(event: MouseEvent) {
      const link = event.target instanceof Element ? event.target.closest("a[href]") : null;
      if (!(link instanceof HTMLAnchorElement) || event.defaultPrevented) return;
      const address = leavingAddress(
        {
          button: event.button,
          modified: event.ctrlKey || event.metaKey || event.shiftKey || event.altKey,
          href: link.href,
          target: link.target,
          download: link.hasAttribute("download"),
        },
        window.location.href,
      );
      if (address === null) return;
      event.preventDefault();
      event.stopPropagation();
      setWanted(address);
    }
    const askBrowser = (event: BeforeUnloadEvent) => event.preventDefault();
    document.addEventListener("click", catchLink, { capture: true });
    window.addEventListener("beforeunload", askBrowser);
    return () => {
      document.removeEventListener("click", catchLink, { capture: true });
      window.removeEventListener("beforeunload", askBrowser);
    };
  }, []);

  return (
    <Dialog
      open={wanted !== null}
      onOpenChange={(open) => !open && setWanted(null)}
      title="Leave without keeping the changes?"
      lead="What you changed on this page is not kept yet and would be lost."
      actions={
        <>
          <Button onClick={() => wanted !== null && router.push(wanted)}>Leave without keeping</Button>
          <Button onClick={() => setWanted(null)}>Go on editing</Button>
          <Button
            kind="primary"
            onClick={() => {
              setWanted(null);
              onKeep();
            }}
          >
            See the effect and keep
          </Button>
        </>
      }
    />
  );
}
