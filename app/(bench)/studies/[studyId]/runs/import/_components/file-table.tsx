import type { Change } from "@/app/_import/change";
import type { ColumnRole } from "@/app/_import/corrections";
import type { ColumnReading, Issue, ShownLine, SpeciesContext } from "@/app/_import/reading";
import { type ReadPreview, speciesHead } from "../view";

/** The lines worth seeing, under boxes that say what each column is read as. Raw text as it stands in the file. */
export function FileTable({
  reading,
  species,
  change,
}: {
  reading: ReadPreview;
  species: readonly SpeciesContext[];
  change: (made: Change) => void;
}) {
  const labels = new Map(reading.traces.map((trace) => [trace.source, trace.label]));
  const faults = new Set(
    reading.issues.flatMap((issue) =>
      issue.severity === "settled" || issue.line === null || issue.column === null
        ? []
        : [`${issue.line}:${issue.column}`],
    ),
  );
  const columns = reading.columns.slice(0, 60);
  return (
    <section
      className="import-table table-scroll"
      aria-label="The file, and what each column is read as"
      tabIndex={0}
    >
      <table>
        <caption className="sr-only">Preview of the file with what each column is read as</caption>
        <thead>
          <tr>
            <th scope="col">Line</th>
            {columns.map((column) => (
              <th key={column.index} scope="col">
                <ColumnBox
                  column={column}
                  label={labels.get(`c${column.index}`)}
                  long={reading.layout.value === "long"}
                  species={species}
                  onChange={(role) => change({ kind: "column", column: column.index, role })}
                />
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {withGaps(reading.shownLines).map(({ shown, gap }) => (
            <Line key={shown.line} line={shown} gap={gap} columns={columns} faults={faults} />
          ))}
        </tbody>
      </table>
      {reading.columns.length > columns.length && (
        <p className="hint">
          {reading.columns.length - columns.length} more columns are read the same way and not shown here.
        </p>
      )}
    </section>
  );
}

/** Each shown line, and whether lines are left out above it. */
function withGaps(lines: readonly ShownLine[]) {
  return lines.map((shown, i) => ({ shown, gap: i > 0 && shown.line > (lines[i - 1]?.line ?? 0) + 1 }));
}

function Line({
  line,
  gap,
  columns,
  faults,
}: {
  line: ShownLine;
  gap: boolean;
  columns: readonly ColumnReading[];
  faults: ReadonlySet<string>;
}) {
  const plain = line.kind === "preamble" || line.kind === "skipped";
  const text = line.cells.filter((cell) => cell !== "").join("   ");
  return (
    <>
      {gap && (
        <tr className="gap">
          <td colSpan={columns.length + 1}>· · ·</td>
        </tr>
      )}
      <tr id={`line-${line.line}`} className={line.kind} tabIndex={-1}>
        <th scope="row">{line.line}</th>
        {plain ? (
          <td colSpan={columns.length}>{text === "" ? "\u2003" : text}</td>
        ) : (
          columns.map((column) => (
            <td
              key={column.index}
              className={[
                faults.has(`${line.line}:${column.index}`) ? "fault" : "",
                column.role === "left-out" ? "left-out" : "",
                column.basis === "stated" ? "stated" : "",
              ]
                .filter(Boolean)
                .join(" ")}
            >
              {line.cells[column.index] ?? ""}
            </td>
          ))
        )}
      </tr>
    </>
  );
}

function ColumnBox({
  column,
  label,
  long,
  species,
  onChange,
}: {
  column: ColumnReading;
  label: string | undefined;
  long: boolean;
  species: readonly SpeciesContext[];
  onChange: (role: ColumnRole) => void;
}) {
  const id = `column-${column.index}`;
  const options: readonly (readonly [ColumnRole, string])[] = [
    ["time", "Time"],
    ["signal", label === undefined ? (long ? "Signal" : "Signal of a run") : `Signal, ${label}`],
    ["run", "Run of the line"],
    ["temperature", "Cell temperature"],
    ...(long ? species.map((one) => [`species:${one.id}`, speciesHead(one)] as const) : []),
    ["left-out", "Leave out"],
  ];
  return (
    <>
      <label htmlFor={id}>Column {column.index + 1}</label>
      <select
        id={id}
        className="select"
        aria-describedby={`${id}-reason`}
        value={column.role}
        onChange={(event) => {
          const chosen = options.find(([role]) => role === event.target.value);
          if (chosen) onChange(chosen[0]);
        }}
      >
        {options.map(([role, name]) => (
          <option key={role} value={role}>
            {name}
          </option>
        ))}
      </select>
      <small id={`${id}-reason`} title={column.reason}>
        {column.reason}
      </small>
    </>
  );
}

/** Scrolls the preview to the line of an issue and marks it for the keyboard. */
export function showLine(issue: Issue): void {
  if (issue.line === null) return;
  const row = document.getElementById(`line-${issue.line}`);
  row?.scrollIntoView({ block: "center" });
  row?.focus({ preventScroll: true });
}
