import type { ReactNode } from "react";

/**
 * The paper of a page. `title` is a finding ("Eleven runs, nine standing"); with `verdict` the title is spoken only
 * and the verdict sentence stands in its place. `margin` is a <Margin>; without it the sheet takes the whole width.
 */
export function Sheet({
  title,
  lead,
  verdict,
  actions,
  margin,
  children,
}: {
  title: ReactNode;
  lead?: ReactNode;
  verdict?: ReactNode;
  actions?: ReactNode;
  margin?: ReactNode;
  children: ReactNode;
}) {
  return (
    <main id="main" tabIndex={-1} className={margin === undefined ? "sheet full" : "sheet"}>
      <div className="min-w-0">
        <div className={verdict === undefined ? "sheet-head" : "sheet-head items-start"}>
          <div className="min-w-0">
            <h1 className={verdict === undefined ? undefined : "sr-only"}>{title}</h1>
            {verdict !== undefined && <p className="verdict">{verdict}</p>}
            {lead !== undefined && <p className="lead">{lead}</p>}
          </div>
          {actions !== undefined && <div className="sheet-actions">{actions}</div>}
        </div>
        {children}
      </div>
      {margin}
    </main>
  );
}

/** Heading inside a sheet with its aside, "Orders · both free, 95 %". */
export function SectionTitle({ children, note }: { children: ReactNode; note?: ReactNode }) {
  return (
    <h2 className="section-title">
      {children}
      {note !== undefined && <small>{note}</small>}
    </h2>
  );
}
