import { Disclosure } from "@/app/_ui/disclosure";
import { typeset } from "@/app/_ui/prose";
import { RunMark } from "@/app/_ui/run-mark";
import { SectionTitle } from "@/app/_ui/sheet";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import type { PairRow } from "./rate-law.view";

/** Pairs that are listed before the rest folds away. */
const SHOWN = 8;

/** Two runs that differ in one concentration give its order by hand: ln(v₂/v₁)/ln(c₂/c₁). */
export function PairTable({ rows }: { rows: readonly PairRow[] }) {
  const rest = rows.slice(SHOWN);
  return (
    <div>
      <SectionTitle note={typeset("ln(*v*_2/*v*_1) over ln(*c*_2/*c*_1)")}>Run against run</SectionTitle>
      <Pairs rows={rows.slice(0, SHOWN)} caption="Orders from pairs of runs" />
      {rest.length > 0 && (
        <Disclosure summary={rest.length === 1 ? "One pair more" : `${rest.length} pairs more`}>
          <Pairs rows={rest} caption="Further pairs of runs" />
        </Disclosure>
      )}
      <p className="mt-1.5 text-label text-ink-3">
        ± is one standard uncertainty from both rates and both concentrations.
      </p>
    </div>
  );
}

function Pairs({ rows, caption }: { rows: readonly PairRow[]; caption: string }) {
  return (
    <DataTable caption={caption}>
      <thead>
        <tr>
          <ColumnHead>Runs</ColumnHead>
          <ColumnHead>Differ in</ColumnHead>
          <ColumnHead numeric>Order</ColumnHead>
        </tr>
      </thead>
      <tbody>
        {rows.map(({ runs: [first, second], species, order }) => (
          <tr key={`${first.label} ${second.label}`}>
            <td>
              <span className="inline-flex flex-wrap gap-x-3">
                <RunMark mark={first.mark} label={first.label} state="standing" />
                <RunMark mark={second.mark} label={second.label} state="standing" />
              </span>
            </td>
            <td className="law">[{species}]</td>
            <td className="num">{order}</td>
          </tr>
        ))}
      </tbody>
    </DataTable>
  );
}
