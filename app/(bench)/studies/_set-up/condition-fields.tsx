"use client";

import { Field } from "@/app/_ui/field";
import type { FormFault } from "./read-set-up-form";
import type { SetUpForm } from "./set-up-form.schema";

type Conditions = Pick<
  SetUpForm,
  | "temperature"
  | "ionicStrength"
  | "pathLength"
  | "wavelength"
  | "activationEnergy"
  | "sampleInterval"
  | "solvent"
  | "electrolyte"
>;

/** Conditions, printed with every k. */
export function ConditionFields({
  form,
  faults,
  readOnly,
  onChange,
}: {
  form: Conditions;
  faults: readonly FormFault[];
  readOnly: boolean;
  onChange: (part: Partial<Conditions>) => void;
}) {
  const box = (path: keyof Conditions) => ({
    value: form[path],
    readOnly,
    error: faults.find((fault) => fault.path === path)?.message,
    onChange: (event: { target: { value: string } }) => onChange({ [path]: event.target.value }),
  });
  return (
    <>
      <div className="grid grid-cols-4 gap-x-5 gap-y-3.5 narrow:grid-cols-2 phone:gap-x-3">
        <Field label="Temperature" unit="°C" {...box("temperature")} />
        <Field label="Ionic strength" unit="mol L^-1" {...box("ionicStrength")} />
        <Field label="Path length" unit="cm" {...box("pathLength")} />
        <Field label="Wavelength" unit="nm" {...box("wavelength")} />
        <div className="col-span-2">
          <Field label="Solvent" {...box("solvent")} />
        </div>
        <Field label="Inert electrolyte" {...box("electrolyte")} />
        <Field label="Time between readings" unit="s" {...box("sampleInterval")} />
        <div className="col-span-2">
          <Field
            label="Activation energy"
            unit="kJ mol^-1"
            placeholder="not known"
            hint="What temperature does to the rate constant counts by it; where it is not known, 80 is assumed."
            {...box("activationEnergy")}
          />
        </div>
      </div>
      <p className="hint max-w-[110ch]">
        Write a value with its standard uncertainty as 25.0 ± 0.1 or 25.0(1). A value without ± is taken as
        exact; a box left empty says nothing.
      </p>
    </>
  );
}
