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

/** What every control shares: its id, what describes it, and how it looks when something is wrong. */
function useFrame({
  id,
  className,
  frame,
  look,
}: {
  id: string | undefined;
  className: string | undefined;
  frame: Frame;
  look: string;
}) {
  const made = useId();
  const own = id ?? made;
  const describing = [frame.error ? `${own}-error` : "", frame.hint ? `${own}-hint` : ""].filter(Boolean);
  return {
    id: own,
    "aria-invalid": frame.error ? (true as const) : undefined,
    "aria-describedby": describing.length === 0 ? undefined : describing.join(" "),
    className: className === undefined ? look : `${look} ${className}`,
  };
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
export function Field({ label, unit, hint, error, className, id, ...rest }: ComponentProps<"input"> & Frame) {
  const frame = { label, unit, hint, error };
  const control = useFrame({ id, className, frame, look: "input" });
  return (
    <FieldFrame id={control.id} frame={frame}>
      <input autoComplete="off" {...control} {...rest} />
    </FieldFrame>
  );
}

/** A choice from a list; `children` are <option> elements. */
export function Select({
  label,
  unit,
  hint,
  error,
  className,
  id,
  ...rest
}: ComponentProps<"select"> & Frame) {
  const frame = { label, unit, hint, error };
  const control = useFrame({ id, className, frame, look: "select" });
  return (
    <FieldFrame id={control.id} frame={frame}>
      <select {...control} {...rest} />
    </FieldFrame>
  );
}

/** A field of several lines. */
export function TextArea({
  label,
  unit,
  hint,
  error,
  className,
  id,
  ...rest
}: ComponentProps<"textarea"> & Frame) {
  const frame = { label, unit, hint, error };
  const control = useFrame({ id, className, frame, look: "input" });
  return (
    <FieldFrame id={control.id} frame={frame}>
      <textarea rows={2} {...control} {...rest} />
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
