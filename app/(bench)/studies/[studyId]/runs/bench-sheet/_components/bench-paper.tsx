import type { ReactNode } from "react";
import { Prose } from "@/app/_ui/prose";
import { RunMark } from "@/app/_ui/run-mark";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import type { BenchRow, BenchSheetView } from "../view";
import "../bench-sheet.css";

/** One sheet of A4 on its side, with blanks for a pen. */
export function BenchPaper({
  view,
  study,
  revision,
  printed,
  cautions,
}: {
  view: BenchSheetView;
  study: string;
  revision: string;
  /** When it was drawn up. */
  printed: string;
  cautions: ReactNode;
}) {
  return (
    <article className="bench-paper" aria-label="Bench sheet">
      <div className="paper-head">
        <span>
          <b className="font-semibold text-ink">Bench sheet</b> · {study}
        </span>
        <span>
          {revision} · {printed}
        </span>
      </div>
      <div className="mb-3.5 flex flex-wrap items-end justify-between gap-x-6 gap-y-2">
        <div>
          <h2 className="paper-title">{view.paperTitle}</h2>
          <p className="mt-0.5 text-ink-2">
            <Prose text={view.conditions} />
          </p>
        </div>
        <p className="flex gap-5 whitespace-nowrap">
          <span>
            Date <span className="blank-line">&nbsp;</span>
          </span>
          <span>
            Initials <span className="blank-line">&nbsp;</span>
          </span>
        </p>
      </div>
      <DataTable caption="Mixtures in the order of measuring" className="min-w-[840px]">
        <thead>
          <tr>
            <ColumnHead numeric>Order</ColumnHead>
            <ColumnHead className="pl-3">Mixture</ColumnHead>
            {view.columns.map(({ id, head, note }) => (
              <ColumnHead key={id} numeric note={note}>
                {head}
              </ColumnHead>
            ))}
            <ColumnHead className="pl-3" note="°C">
              Cell
            </ColumnHead>
            <ColumnHead className="pl-3" note="hh:mm">
              Started
            </ColumnHead>
            <ColumnHead className="pl-3">File</ColumnHead>
            <ColumnHead className="pl-3">Remark</ColumnHead>
          </tr>
        </thead>
        <tbody>
          {view.rows.map((row, index) => (
            <Row key={row.key} row={row} columns={view.columns} order={index + 1} />
          ))}
        </tbody>
      </DataTable>
      <div className="mt-4 grid grid-cols-2 items-start gap-x-9 gap-y-4 phone:grid-cols-1">
        <div>
          <h3>Stocks at hand</h3>
          <table className="w-full">
            <tbody>
              {view.stocks.map(({ name, lines, lot }) => (
                <tr key={name} className="align-top">
                  <th scope="row" className="py-0.5 pr-3 text-left font-normal">
                    {name}
                  </th>
                  <td className="py-0.5 pr-3">
                    {lines.map((line) => (
                      <span key={line} className="block">
                        <Prose text={line} />
                      </span>
                    ))}
                  </td>
                  <td className="py-0.5">{lot}</td>
                </tr>
              ))}
            </tbody>
          </table>
          <p className="mt-2 text-ink-2">
            One cell and one pipette: between runs rinse three times with the next mixture, before it is
            started.
          </p>
        </div>
        {cautions}
      </div>
      <div className="paper-foot">
        <span>Ratewright</span>
        <span>What is written in the blanks is typed in when the traces are stored</span>
      </div>
    </article>
  );
}

function Row({ row, columns, order }: { row: BenchRow; columns: BenchSheetView["columns"]; order: number }) {
  return (
    <tr>
      <td className="num">{order}</td>
      <th scope="row" className="pl-3">
        {row.mark === null ? (
          <b className="font-semibold">{row.label}</b>
        ) : (
          <RunMark mark={row.mark} label={row.label} state="without-rate" />
        )}
      </th>
      {row.volumes.map((volume, index) => (
        <td
          key={columns[index]?.id}
          className={index === row.volumes.length - 1 ? "num font-semibold" : "num"}
        >
          {volume}
        </td>
      ))}
      <td className="blank-box" />
      <td className="blank-box" />
      <td className="blank-box" />
      <td className="pl-3">{row.remark}</td>
    </tr>
  );
}
