import { type ReactNode, useId } from "react";
import type { Change } from "@/app/_import/change";
import type { StudyContext } from "@/app/_import/reading";
import type { ReadPreview } from "../view";
import { signalUnitOptions } from "../view";

type Set = Extract<Change, { kind: "set" }>["values"];

/** How the file is read: every guess with its reason, and a box to correct it. */
export function LayoutBar({
  reading,
  signal,
  change,
}: {
  reading: ReadPreview;
  signal: StudyContext["signal"];
  change: (made: Change) => void;
}) {
  const set = (values: Set) => change({ kind: "set", values });
  const { from, to } = reading.dataLines.value;
  // A workbook and a JCAMP-DX file say for themselves how their cells are divided.
  const isText = reading.container === "text";
  return (
    <div className="import-layout">
      <Guess name="Layout" reason={reading.layout.reason}>
        {() => <b>{LAYOUT_NAMES[reading.layout.value]}</b>}
      </Guess>
      {reading.sheet !== null && reading.sheet.names.length > 1 && (
        <Guess name="Sheet" reason={reading.sheet.reason}>
          {(id) => (
            <Choice
              id={id}
              value={reading.sheet?.value ?? ""}
              onChange={(sheet) => set({ sheet })}
              options={(reading.sheet?.names ?? []).map((name) => [name, name] as const)}
            />
          )}
        </Guess>
      )}
      {isText && (
        <>
          <Guess name="Separator" reason={reading.separator.reason}>
            {(id) => (
              <Choice
                id={id}
                value={reading.separator.value}
                onChange={(separator) => set({ separator })}
                options={SEPARATORS}
              />
            )}
          </Guess>
          <Guess
            name="Decimal mark"
            reason={reading.decimalMark.reason}
            open={reading.decimalMark.value === null}
          >
            {(id) => (
              <Choice
                id={id}
                value={reading.decimalMark.value ?? ""}
                onChange={(mark) => mark !== "" && set({ decimalMark: mark })}
                options={reading.decimalMark.value === null ? [["", "choose"], ...MARKS] : MARKS}
              />
            )}
          </Guess>
        </>
      )}
      <Guess name="Names on line" reason={reading.headerLine.reason}>
        {(id) => (
          <LineNumber
            id={id}
            value={reading.headerLine.value}
            optional
            onChange={(headerLine) => set({ headerLine })}
          />
        )}
      </Guess>
      <Guess name="Units on line" reason={reading.unitLine.reason}>
        {(id) => (
          <LineNumber
            id={id}
            value={reading.unitLine.value}
            optional
            onChange={(unitLine) => set({ unitLine })}
          />
        )}
      </Guess>
      <Guess name="Data from line" reason={reading.dataLines.reason}>
        {(id) => (
          <LineNumber
            id={id}
            value={from}
            onChange={(line) => line !== null && set({ firstDataLine: line })}
          />
        )}
      </Guess>
      <Guess name="Data to line" reason={`${reading.lines} ${LINES_OF[reading.container]}`}>
        {(id) => (
          <LineNumber id={id} value={to} onChange={(line) => line !== null && set({ lastDataLine: line })} />
        )}
      </Guess>
      <Guess name="Time in" reason={reading.timeUnit.reason}>
        {(id) => (
          <Choice
            id={id}
            value={reading.timeUnit.value}
            onChange={(timeUnit) => set({ timeUnit })}
            options={TIME_UNITS}
          />
        )}
      </Guess>
      <Guess name="Signal in" reason={reading.signalUnit.reason}>
        {(id) => (
          <Choice
            id={id}
            value={reading.signalUnit.value}
            onChange={(signalUnit) => set({ signalUnit })}
            options={signalUnitOptions(signal).map(({ value, label }) => [value, label] as const)}
          />
        )}
      </Guess>
      {isText && (
        <Guess name="Characters" reason={reading.encoding.reason}>
          {(id) => (
            <Choice
              id={id}
              value={reading.encoding.value}
              onChange={(encoding) => set({ encoding })}
              options={ENCODINGS}
            />
          )}
        </Guess>
      )}
    </div>
  );
}

const LINES_OF = {
  text: "lines in the file",
  workbook: "rows in the sheet",
  "jcamp-dx": "lines in the table",
} as const;
const LAYOUT_NAMES = {
  wide: "One time column, many signals",
  paired: "A time column for each signal",
  long: "A line for each reading of a run",
} as const;
const SEPARATORS = [
  [",", "comma"],
  [";", "semicolon"],
  ["\t", "tab"],
  ["|", "vertical bar"],
  [" ", "blanks"],
] as const;
const MARKS = [
  [".", "point"],
  [",", "comma"],
  ["either", "point or comma"],
] as const;
const TIME_UNITS = [
  ["ms", "ms"],
  ["s", "s"],
  ["min", "min"],
  ["h", "h"],
] as const;
const ENCODINGS = [
  ["utf-8", "UTF-8"],
  ["windows-1252", "Windows-1252"],
  ["utf-16le", "UTF-16 LE"],
  ["utf-16be", "UTF-16 BE"],
] as const;

function Guess({
  name,
  reason,
  open = false,
  children,
}: {
  name: string;
  reason: string;
  open?: boolean;
  children: (id: string) => ReactNode;
}) {
  const id = useId();
  return (
    <div className={open ? "open" : undefined}>
      <label htmlFor={id}>{name}</label>
      {children(id)}
      <small id={`${id}-reason`}>{reason}</small>
    </div>
  );
}

function Choice<Value extends string>({
  id,
  value,
  options,
  onChange,
}: {
  id: string;
  value: Value;
  options: readonly (readonly [Value, string])[];
  onChange: (value: Value) => void;
}) {
  return (
    <select
      id={id}
      className="select"
      aria-describedby={`${id}-reason`}
      value={value}
      onChange={(event) => {
        const chosen = options.find(([option]) => option === event.target.value);
        if (chosen) onChange(chosen[0]);
      }}
    >
      {options.map(([option, label]) => (
        <option key={option} value={option}>
          {label}
        </option>
      ))}
    </select>
  );
}

/** A line number, kept on Enter or when the box is left. Empty means that there is no such line. */
function LineNumber({
  id,
  value,
  optional = false,
  onChange,
}: {
  id: string;
  value: number | null;
  optional?: boolean;
  onChange: (value: number | null) => void;
}) {
  function keep(text: string) {
    const line = text.trim() === "" ? null : Number(text);
    if (line === null ? !optional : !Number.isInteger(line) || line < 1) return;
    if (line !== value) onChange(line);
  }
  return (
    <input
      // The reader's answer replaces what stands here, whoever changed it.
      key={value ?? "none"}
      id={id}
      className="input"
      inputMode="numeric"
      autoComplete="off"
      aria-describedby={`${id}-reason`}
      placeholder={optional ? "none" : undefined}
      defaultValue={value ?? ""}
      onBlur={(event) => keep(event.target.value)}
      onKeyDown={(event) => event.key === "Enter" && keep(event.currentTarget.value)}
    />
  );
}
