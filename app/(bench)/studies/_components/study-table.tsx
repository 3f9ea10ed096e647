import Link from "next/link";
import { SeverityMark } from "@/app/_ui/check";
import { Constant, LawExpression } from "@/app/_ui/law";
import { Prose } from "@/app/_ui/prose";
import { DataTable } from "@/app/_ui/table";
import type { StudyRow } from "../view";
import { StudyThumbnail } from "./study-thumbnail";
import "./study-table.css";

/** Studies by their traces, law and evidence. */
export function StudyTable({ caption, rows }: { caption: string; rows: readonly StudyRow[] }) {
  return (
    <DataTable caption={caption} className="study-table">
      <thead>
        <tr>
          <th scope="col" className="num">
            No.
          </th>
          <th scope="col">Traces</th>
          <th scope="col">Study</th>
          <th scope="col">Standing law and its constant</th>
          <th scope="col" className="num">
            Runs
          </th>
          <th scope="col">Checks</th>
          <th scope="col">Last entry</th>
        </tr>
      </thead>
      <tbody>
        {rows.map((row) => (
          <tr key={row.studyId}>
            <td className="num number">{row.number}</td>
            <td className="traces">
              <StudyThumbnail traces={row.thumbnail} />
            </td>
            <th scope="row" className="study">
              <Link href={`/studies/${row.studyId}`}>{row.name}</Link>
              {row.invented && <span className="invented">Invented data</span>}
              <span className="second">
                <Prose text={row.conditions} />
              </span>
            </th>
            <td className="law-cell">
              <Law row={row} />
            </td>
            <td className="num runs">
              {row.runs}
              <span className="second">{row.aside === 0 ? "\u00a0" : `${row.aside} aside`}</span>
            </td>
            <td className="checks">
              {row.checks === null ? (
                <span className="severity text-ink-2">
                  <Gathering />
                  gathering
                </span>
              ) : (
                <SeverityMark severity={row.checks.severity}>{row.checks.words}</SeverityMark>
              )}
            </td>
            <td className="entry whitespace-nowrap">
              {row.lastEntry}
              <span className="second">{row.by}</span>
            </td>
          </tr>
        ))}
      </tbody>
    </DataTable>
  );
}

function Law({ row: { law } }: { row: StudyRow }) {
  if (law.status === "no-law") {
    return (
      <span className="text-ink-3">
        No law yet. <Prose text={law.missing} />
      </span>
    );
  }
  return (
    <>
      <span className="text-[18px] leading-[1.25]">
        <LawExpression law={law.expression} />
      </span>
      <span className="second text-ink">
        <Constant constant={law.constant} marked />
      </span>
    </>
  );
}

function Gathering() {
  return (
    <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden="true">
      <circle
        cx="6"
        cy="6"
        r="4.6"
        fill="none"
        stroke="var(--ctl)"
        strokeWidth="1.4"
        strokeDasharray="2.2 1.6"
      />
    </svg>
  );
}
