import { type ComponentProps, type ReactNode, useId } from "react";
import { SeverityShape } from "./check";
import { Unit } from "./unit";

interface Frame {
  label: ReactNode;
  /** Plain text, "mmol L^-1", beside the label. */
  unit?: string | undefined;
  hint?: ReactNode;
  /** A sentence that says what is wrong and the way out. */
  error?: ReactNode;
}

function describedBy(id: string, frame: Frame): string | undefined {
  const ids = [frame.error ? `${id}-error` : "", frame.hint ? `${id}-hint` : ""].filter(Boolean);
  return ids.length === 0 ? undefined : ids.join(" ");
}

function FieldFrame({ id, frame, children }: { id: string; frame: Frame; children: ReactNode }) {
  return (
    <div className="min-w-0">
      <label htmlFor={id} className="field-label">
        {frame.label}
        {frame.unit !== undefined && (
          <span className="unit-note">
            <Unit text={frame.unit} />
          </span>
        )}
      </label>
      {children}
      {frame.error && (
        <p id={`${id}-error`} className="field-error">
          <SeverityShape severity="blocks" />
          <span>{frame.error}</span>
        </p>
      )}
      {frame.hint && (
        <p id={`${id}-hint`} className="hint">
          {frame.hint}
        </p>
      )}
    </div>
  );
}

/** A one-line field. Value and uncertainty share one box, "25.0 ± 0.1"; no ± means exact. */
export function Field({
  label,
  unit,
  hint,
  error,
  className = "",
  id,
  ...rest
}: ComponentProps<"input"> & Frame) {
  const made = useId();
  const frame = { label, unit, hint, error };
  return (
    <FieldFrame id={id ?? made} frame={frame}>
      <input
        id={id ?? made}
        autoComplete="off"
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id ?? made, frame)}
        className={`input ${className}`.trim()}
        {...rest}
      />
    </FieldFrame>
  );
}

/** A choice from a list; `children` are <option> elements. */
export function Select({
  label,
  unit,
  hint,
  error,
  className = "",
  id,
  ...rest
}: ComponentProps<"select"> & Frame) {
  const made = useId();
  const frame = { label, unit, hint, error };
  return (
    <FieldFrame id={id ?? made} frame={frame}>
      <select
        id={id ?? made}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id ?? made, frame)}
        className={`select ${className}`.trim()}
        {...rest}
      />
    </FieldFrame>
  );
}

/** A field of several lines. */
export function TextArea({
  label,
  unit,
  hint,
  error,
  className = "",
  id,
  ...rest
}: ComponentProps<"textarea"> & Frame) {
  const made = useId();
  const frame = { label, unit, hint, error };
  return (
    <FieldFrame id={id ?? made} frame={frame}>
      <textarea
        id={id ?? made}
        rows={2}
        aria-invalid={error ? true : undefined}
        aria-describedby={describedBy(id ?? made, frame)}
        className={`input ${className}`.trim()}
        {...rest}
      />
    </FieldFrame>
  );
}

/** A tick box or a radio with its label and an optional second line. */
export function Choice({
  type,
  label,
  note,
  ...rest
}: Omit<ComponentProps<"input">, "type"> & {
  type: "checkbox" | "radio";
  label: ReactNode;
  note?: ReactNode;
}) {
  return (
    <label className="choice">
      <input type={type} className={type} {...rest} />
      <span>{label}</span>
      {note !== undefined && <small>{note}</small>}
    </label>
  );
}
