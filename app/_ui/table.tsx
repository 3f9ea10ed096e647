import type { ReactNode } from "react";
import { Unit } from "./unit";

/** A ruled table that scrolls sideways inside its own frame on narrow screens. `caption` is spoken only. */
export function DataTable({
  caption,
  className = "",
  children,
}: {
  caption: string;
  className?: string;
  children: ReactNode;
}) {
  return (
    // A region that scrolls must be reachable by keyboard.
    <section className="table-scroll" aria-label={caption} tabIndex={0}>
      <table className={`data-table ${className}`.trim()}>{children}</table>
    </section>
  );
}

/** Column head with its unit on the second line; `numeric` aligns right. */
export function ColumnHead({
  unit,
  note,
  numeric = false,
  className = "",
  children,
}: {
  /** Plain text, "mmol L^-1". */
  unit?: string | undefined;
  /** Instead of a unit, words: "70 s, window marked". */
  note?: ReactNode;
  numeric?: boolean;
  className?: string;
  children: ReactNode;
}) {
  return (
    <th scope="col" className={`${numeric ? "num" : ""} ${className}`.trim() || undefined}>
      {children}
      {unit !== undefined && (
        <span className="head-unit">
          <Unit text={unit} />
        </span>
      )}
      {note !== undefined && <span className="head-unit">{note}</span>}
    </th>
  );
}

/** "Hydroxide varied, [A] held at 50.0 µmol L⁻¹" across all columns. */
export function GroupRow({ columns, children }: { columns: number; children: ReactNode }) {
  return (
    <tr className="group-row">
      <th scope="rowgroup" colSpan={columns}>
        {children}
      </th>
    </tr>
  );
}
