import type { ReactNode } from "react";

/** A part that opens on demand; works without script. */
export function Disclosure({
  summary,
  open = false,
  children,
}: {
  summary: ReactNode;
  open?: boolean;
  children: ReactNode;
}) {
  return (
    <details className="disclosure" open={open}>
      <summary>{summary}</summary>
      {children}
    </details>
  );
}
