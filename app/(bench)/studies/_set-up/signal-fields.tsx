"use client";

import { Choice, Field, Select } from "@/app/_ui/field";
import { parseUncertain } from "@/app/_worksheet/typed-number/parse-uncertain";
import type { FormFault } from "./read-set-up-form";
import type { SetUpForm } from "./set-up-form.schema";
import { CONCENTRATION_UNITS } from "./species-table";

type Signal = SetUpForm["signal"];

/** What the instrument gave: a signal with its calibration factor, or concentrations already. */
export function SignalFields({
  signal,
  followedName,
  faults,
  readOnly,
  standardsFactor = null,
  onChange,
}: {
  signal: Signal;
  followedName: string;
  /** The factor as the standards give it, where the signal follows them; null where it is typed. */
  standardsFactor?: string | null;
  faults: readonly FormFault[];
  readOnly: boolean;
  onChange: (signal: Signal) => void;
}) {
  const faultOf = (path: string) => faults.find((fault) => fault.path === `signal.${path}`)?.message;
  const factorUnit = signal.unit.trim() === "" ? "L mol^-1" : `${signal.unit.trim()} L mol^-1`;
  const absorbance = /^absorb/i.test(signal.quantity.trim());
  return (
    <fieldset>
      <legend className="sr-only">Signal</legend>
      <div className="flex flex-wrap gap-x-8">
        <Choice
          type="radio"
          name="signal"
          label={`A signal in proportion to ${followedName}`}
          checked={signal.kind === "calibrated"}
          disabled={readOnly}
          onChange={() => onChange({ ...signal, kind: "calibrated" })}
        />
        <Choice
          type="radio"
          name="signal"
          label={`The concentration of ${followedName} itself`}
          checked={signal.kind === "concentration"}
          disabled={readOnly}
          onChange={() => onChange({ ...signal, kind: "concentration" })}
        />
        <Choice
          type="radio"
          name="signal"
          label="No traces: rates are entered by hand"
          checked={signal.kind === "none"}
          disabled={readOnly}
          onChange={() => onChange({ ...signal, kind: "none" })}
        />
      </div>
      {signal.kind === "calibrated" && (
        <div className="mt-2 grid grid-cols-4 gap-x-5 gap-y-3.5 narrow:grid-cols-2 phone:grid-cols-1">
          <Field
            label="Quantity"
            list="signal-quantities"
            value={signal.quantity}
            readOnly={readOnly}
            error={faultOf("quantity")}
            onChange={(event) => onChange({ ...signal, quantity: event.target.value })}
          />
          <datalist id="signal-quantities">
            <option value="Absorbance" />
            <option value="Conductivity" />
            <option value="Peak area" />
            <option value="Fluorescence" />
            <option value="Pressure" />
          </datalist>
          <Field
            label="Its unit"
            value={signal.unit}
            readOnly={readOnly}
            placeholder="none"
            onChange={(event) => onChange({ ...signal, unit: event.target.value })}
          />
          <div className="col-span-2 phone:col-span-1">
            <Field
              label={absorbance ? "ε·l" : "Calibration factor"}
              unit={factorUnit}
              value={signal.perMolar}
              readOnly={readOnly}
              placeholder="17930 ± 55"
              error={faultOf("perMolar")}
              hint={
                standardsFactor === null
                  ? factorHint(signal.perMolar, absorbance)
                  : signal.perMolar === standardsFactor
                    ? "Follows the standards and changes with them. Type another factor to part it from them."
                    : `A typed factor, no longer that of the standards. ${factorHint(signal.perMolar, absorbance)}`
              }
              onChange={(event) => onChange({ ...signal, perMolar: event.target.value })}
            />
          </div>
          <div className="col-span-2 phone:col-span-1">
            <Field
              label="Signal of the blank"
              unit={signal.unit.trim()}
              value={signal.blank}
              readOnly={readOnly}
              placeholder="not known"
              error={faultOf("blank")}
              hint={`The mixture without ${followedName}. With it each run’s time zero is checked against its recipe.`}
              onChange={(event) => onChange({ ...signal, blank: event.target.value })}
            />
          </div>
        </div>
      )}
      {signal.kind === "concentration" && (
        <div className="mt-2 max-w-64">
          <Select
            label="Unit in the files"
            value={signal.concentrationUnit}
            disabled={readOnly}
            onChange={(event) => {
              const unit = CONCENTRATION_UNITS.find(([value]) => value === event.target.value)?.[0];
              if (unit) onChange({ ...signal, concentrationUnit: unit });
            }}
          >
            {CONCENTRATION_UNITS.map(([value, words]) => (
              <option key={value} value={value}>
                {words}
              </option>
            ))}
          </Select>
        </div>
      )}
    </fieldset>
  );
}

/** Says back how the box is read: a comma that was meant for thousands shows at once. */
function factorHint(text: string, absorbance: boolean): string {
  const reading = parseUncertain(text);
  if (reading.status === "uncertain") {
    const { value, standardUncertainty } = reading;
    return `Read as ${value}${standardUncertainty === 0 ? ", exact" : ` with a standard uncertainty of ${standardUncertainty}`}.`;
  }
  return absorbance
    ? "Molar absorption coefficient times path length. Without it runs can be stored, and rates wait for it."
    : "Slope of the calibration line. Without it runs can be stored, and rates wait for it.";
}
