"use client";

import { Dialog as Radix } from "radix-ui";
import type { ReactNode } from "react";

/** A question over the page. Focus is kept inside and returns on close; Esc closes. `actions` are its buttons. */
export function Dialog({
  open,
  onOpenChange,
  title,
  lead,
  actions,
  children,
}: {
  open: boolean;
  onOpenChange: (open: boolean) => void;
  title: ReactNode;
  lead?: ReactNode;
  actions: ReactNode;
  children?: ReactNode;
}) {
  return (
    <Radix.Root open={open} onOpenChange={onOpenChange}>
      <Radix.Portal>
        <Radix.Overlay className="dialog-overlay" />
        <Radix.Content className="dialog" {...(lead === undefined ? { "aria-describedby": undefined } : {})}>
          <Radix.Title asChild>
            <h2>{title}</h2>
          </Radix.Title>
          {lead !== undefined && (
            <Radix.Description asChild>
              <p>{lead}</p>
            </Radix.Description>
          )}
          {children}
          <div className="mt-4 flex flex-wrap justify-end gap-2">{actions}</div>
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}
