import { SeverityMark } from "@/app/_ui/check";
import { typeset } from "@/app/_ui/prose";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import type { RunRangeRow } from "../run-range";

/** How far along the line the trace of each run can come. */
export function RunRangeTable({ rows }: { rows: readonly RunRangeRow[] }) {
  return (
    <DataTable caption="Runs on the line" className="max-w-180">
      <thead>
        <tr>
          <ColumnHead>Run</ColumnHead>
          <ColumnHead numeric>Reaches</ColumnHead>
          <ColumnHead>Its whole trace</ColumnHead>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.runId}>
            <th scope="row" className="font-semibold!">
              {row.label}
            </th>
            <td className="num">{typeset(row.largest)}</td>
            <td>
              <SeverityMark severity={row.severity}>{row.verdict}</SeverityMark>
            </td>
          </tr>
        ))}
      </tbody>
    </DataTable>
  );
}
