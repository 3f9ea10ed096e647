import type { ReactNode } from "react";
import { type CheckSeverity, SeverityMark } from "./check";

/** Something that needs an answer before going on: what happened, what was kept, and `actions` with the repairs. One that blocks interrupts. */
export function Notice({
  severity,
  title,
  actions,
  children,
}: {
  severity: CheckSeverity;
  title: ReactNode;
  actions?: ReactNode;
  children?: ReactNode;
}) {
  const edge = severity === "blocks" ? "stop" : severity === "weakens" ? "warn" : "";
  return (
    <div className={`notice ${edge}`.trim()} role={severity === "blocks" ? "alert" : undefined}>
      <SeverityMark severity={severity}>{title}</SeverityMark>
      {children !== undefined && <div className="mt-1 max-w-[64ch]">{children}</div>}
      {actions !== undefined && <div className="mt-3 flex flex-wrap items-center gap-2">{actions}</div>}
    </div>
  );
}
