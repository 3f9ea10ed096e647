import type { ReactNode } from "react";

/** The right-hand column where checks speak; under 1180 px it drops below the sheet in two columns. */
export function Margin({ label, children }: { label: string; children: ReactNode }) {
  return (
    <aside className="margin-column" aria-label={label}>
      {children}
    </aside>
  );
}

/** A titled part of the margin; parts are parted by a rule. */
export function MarginSection({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="margin-section">
      <h2>{title}</h2>
      {children}
    </section>
  );
}
