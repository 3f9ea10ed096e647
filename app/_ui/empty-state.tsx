import type { ReactNode } from "react";
import { BlankPaper } from "../_figures/blank-paper";

/** Blank chart paper, what is missing, the next act and the least data needed. */
export function EmptyState({
  title,
  actions,
  children,
}: {
  title: ReactNode;
  actions?: ReactNode;
  children: ReactNode;
}) {
  return (
    <div className="empty-state">
      <BlankPaper width={300} height={120} />
      <h2>{title}</h2>
      <p>{children}</p>
      {actions !== undefined && (
        <div className="mt-1.5 flex flex-wrap items-center gap-x-4 gap-y-2">{actions}</div>
      )}
    </div>
  );
}
