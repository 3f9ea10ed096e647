import { typeset } from "@/app/_ui/prose";
import { RunMark } from "@/app/_ui/run-mark";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import { AlignedNumber } from "@/app/_ui/value";
import type { SharedRunsView } from "../view";

/** Every run with what it started from and the rate that came out; runs set aside stay, with their reason. */
export function SharedRuns({ runs }: { runs: SharedRunsView }) {
  return (
    <>
      <DataTable caption="Runs and initial rates">
        <thead>
          <tr>
            <ColumnHead>Run</ColumnHead>
            {runs.concentrations.map((one) => (
              <ColumnHead key={one.head} numeric unit={one.unit}>
                {typeset(one.head)}
              </ColumnHead>
            ))}
            <ColumnHead numeric unit={runs.rate.unit}>
              Initial rate
            </ColumnHead>
            <ColumnHead numeric unit="%" className="phone:hidden">
              Residual
            </ColumnHead>
            <ColumnHead className="phone:hidden">Remark</ColumnHead>
          </tr>
        </thead>
        <tbody>
          {runs.rows.map((row) => (
            <tr key={row.label} className={row.state === "set-aside" ? "set-aside" : undefined}>
              <td>
                <RunMark mark={row.mark} label={row.label} state={row.state} />
                {row.remark !== "" && (
                  <small className="hidden text-label text-ink-3 phone:block">{typeset(row.remark)}</small>
                )}
              </td>
              {runs.concentrations.map((one, index) => (
                <td key={one.head} className="num">
                  <AlignedNumber text={row.concentrations[index] ?? null} {...one.column} />
                </td>
              ))}
              <td className="num">
                {row.rate === null ? (
                  <span className="text-ink-3">no rate</span>
                ) : (
                  <>
                    <AlignedNumber text={row.rate.value} {...runs.rate.column} />
                    <span className="ml-1.5 inline-block min-w-[5.4ch] text-left text-caption text-ink-2">
                      {row.rate.uncertainty === null ? "" : `± ${row.rate.uncertainty}`}
                    </span>
                  </>
                )}
              </td>
              <td className="num phone:hidden">{row.residual ?? "\u2003"}</td>
              <td className="text-caption phone:hidden">{typeset(row.remark)}</td>
            </tr>
          ))}
        </tbody>
      </DataTable>
      <p className="pt-1.5 text-label text-ink-3">
        ± is one standard uncertainty of the run alone. A residual is the rate's distance from the law.
      </p>
    </>
  );
}
