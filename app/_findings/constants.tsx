import { typeset } from "@/app/_ui/prose";
import { SectionTitle } from "@/app/_ui/sheet";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import { Unit } from "@/app/_ui/unit";
import { Value } from "@/app/_ui/value";
import type { BudgetView, ConstantRow } from "./rate-law.view";

/** k by every reading of the orders; what stands is marked. */
export function ConstantTable({ rows }: { rows: readonly ConstantRow[] }) {
  return (
    <div>
      <SectionTitle note="95 %">Constants</SectionTitle>
      <DataTable caption="Rate constants with their intervals">
        <thead>
          <tr>
            <ColumnHead>Quantity</ColumnHead>
            <ColumnHead numeric>Value ± half width</ColumnHead>
            <ColumnHead numeric>Interval</ColumnHead>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr key={row.name} className={row.standing ? "standing" : undefined}>
              <td>
                {typeset(row.name)}
                {row.standing && <span className="sr-only">, stands</span>}
                <small className="block text-label text-ink-3">
                  <Unit text={row.unit} />
                </small>
              </td>
              <td className="num">
                <Value number={row.number} setting="table" />
              </td>
              <td className="num">{row.interval === null ? "none" : typeset(row.interval)}</td>
            </tr>
          ))}
        </tbody>
      </DataTable>
    </div>
  );
}

/** Where the interval comes from, line by line; the lines add up in squares. */
export function BudgetTable({ budget }: { budget: BudgetView }) {
  return (
    <div>
      <SectionTitle note={typeset(`of ${budget.of}, lines add in squares`)}>Uncertainty budget</SectionTitle>
      <DataTable caption="Uncertainty budget">
        <thead>
          <tr>
            <ColumnHead>Source</ColumnHead>
            <ColumnHead numeric unit={budget.unit}>
              ± 95 %
            </ColumnHead>
            <ColumnHead numeric unit="%">
              Share
            </ColumnHead>
          </tr>
        </thead>
        <tbody>
          {budget.rows.map((row) => (
            <tr key={row.source}>
              <td>{typeset(row.source)}</td>
              <td className="num">{row.half}</td>
              <td className="num">{row.share}</td>
            </tr>
          ))}
          <tr>
            <th scope="row">
              <b>Together</b>
            </th>
            <td className="num">
              <b>{budget.total}</b>
            </td>
            <td className="num">100</td>
          </tr>
        </tbody>
      </DataTable>
      {budget.note !== "" && <p className="mt-1.5 text-label text-ink-3">{typeset(budget.note)}</p>}
    </div>
  );
}
