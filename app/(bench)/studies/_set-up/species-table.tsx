"use client";

import { Button } from "@/app/_ui/button";
import { Formula } from "@/app/_ui/formula";
import { signed } from "./reaction-view";
import type { FormFault } from "./read-set-up-form";
import type { SpeciesForm } from "./set-up-form.schema";
import "./species-table.css";

const ROLES: readonly (readonly [SpeciesForm["role"], string])[] = [
  ["reactant", "Reactant"],
  ["product", "Product"],
  ["catalyst", "Catalyst"],
  ["inhibitor", "Inhibitor"],
  ["solvent", "Solvent, held constant"],
  ["spectator", "Spectator"],
];

export const CONCENTRATION_UNITS: readonly (readonly [SpeciesForm["unit"], string])[] = [
  ["mol/L", "mol L⁻¹"],
  ["mmol/L", "mmol L⁻¹"],
  ["umol/L", "µmol L⁻¹"],
];

/** One row a species: what it is, its part in the reaction and in the law, and which one is followed. */
export function SpeciesTable({
  species,
  faults,
  readOnly,
  onChange,
}: {
  species: readonly SpeciesForm[];
  faults: readonly FormFault[];
  readOnly: boolean;
  onChange: (species: SpeciesForm[]) => void;
}) {
  const change = (index: number, part: Partial<SpeciesForm>) =>
    onChange(species.map((row, position) => (position === index ? { ...row, ...part } : row)));
  const add = (role: SpeciesForm["role"]) =>
    onChange([
      ...species,
      {
        id: "",
        symbol: role === "catalyst" ? freeLetter(species) : "",
        name: "",
        formula: "",
        stoichiometricNumber: 0,
        charge: 0,
        role,
        inLaw: role === "catalyst",
        unit: "mmol/L",
        followed: false,
      },
    ]);
  return (
    <>
      <table className="data-table species-table">
        <caption className="sr-only">Species of the reaction</caption>
        <thead>
          <tr>
            <th scope="col">Symbol</th>
            <th scope="col">Species</th>
            <th scope="col" className="num">
              ν
            </th>
            <th scope="col" className="num">
              Charge
            </th>
            <th scope="col">Role</th>
            <th scope="col">In the law</th>
            <th scope="col">Shown in</th>
            <th scope="col">Followed</th>
          </tr>
        </thead>
        <tbody>
          {species.map((row, index) => (
            <SpeciesRow
              key={row.id || `new ${index}`}
              row={row}
              index={index}
              faults={faults.filter(({ path }) => path.startsWith(`species.${index}.`))}
              readOnly={readOnly}
              onChange={(part) => change(index, part)}
              onFollow={() =>
                onChange(species.map((other, position) => ({ ...other, followed: position === index })))
              }
              onRemove={() => onChange(species.filter((_, position) => position !== index))}
            />
          ))}
        </tbody>
      </table>
      {!readOnly && (
        <p className="mt-3 flex flex-wrap items-center gap-2">
          <Button size="small" onClick={() => add("spectator")}>
            Add a species
          </Button>
          <Button size="small" onClick={() => add("catalyst")}>
            Add a catalyst or inhibitor
          </Button>
        </p>
      )}
    </>
  );
}

function freeLetter(species: readonly SpeciesForm[]): string {
  const taken = new Set(species.map(({ symbol }) => symbol));
  return [..."CDEFGHIJKLMNQRSTUVWXYZ"].find((letter) => !taken.has(letter)) ?? "";
}

function SpeciesRow({
  row,
  index,
  faults,
  readOnly,
  onChange,
  onFollow,
  onRemove,
}: {
  row: SpeciesForm;
  index: number;
  faults: readonly FormFault[];
  readOnly: boolean;
  onChange: (part: Partial<SpeciesForm>) => void;
  onFollow: () => void;
  onRemove: () => void;
}) {
  const name = row.name || row.formula || row.symbol || `species ${index + 1}`;
  const faultId = `species-${index}-fault`;
  const ofReaction = row.stoichiometricNumber !== 0;
  return (
    <>
      <tr>
        <td className="symbol">
          <input
            className="input law"
            aria-label={`Symbol of ${name}`}
            aria-invalid={faults.length > 0 ? true : undefined}
            aria-describedby={faults.length > 0 ? faultId : undefined}
            value={row.symbol}
            maxLength={12}
            readOnly={readOnly}
            onChange={(event) => onChange({ symbol: event.target.value })}
          />
        </td>
        <td className="name">
          <input
            className="input"
            aria-label={`Name of ${row.formula || `species ${index + 1}`}`}
            placeholder={row.formula === "" ? "Name" : "Name, for example hydroxide"}
            value={row.name}
            maxLength={120}
            readOnly={readOnly}
            onChange={(event) => onChange({ name: event.target.value })}
          />
          {row.formula !== "" && row.formula !== row.name && (
            <small>
              <Formula text={row.formula} />
            </small>
          )}
        </td>
        <td className="num nu" data-label="ν">
          {signed(row.stoichiometricNumber)}
        </td>
        <td className="num charge" data-label="charge">
          {ofReaction || readOnly ? (
            signed(row.charge)
          ) : (
            <select
              className="select"
              aria-label={`Charge of ${name}`}
              value={row.charge}
              onChange={(event) => onChange({ charge: Number(event.target.value) })}
            >
              {[-4, -3, -2, -1, 0, 1, 2, 3, 4].map((charge) => (
                <option key={charge} value={charge}>
                  {signed(charge)}
                </option>
              ))}
            </select>
          )}
        </td>
        <td className="role">
          <select
            className="select"
            aria-label={`Role of ${name}`}
            value={row.role}
            disabled={readOnly}
            onChange={(event) => {
              const role = ROLES.find(([value]) => value === event.target.value)?.[0];
              if (role) onChange({ role });
            }}
          >
            {ROLES.map(([value, words]) => (
              <option key={value} value={value}>
                {words}
              </option>
            ))}
          </select>
        </td>
        <td className="in-law" data-label="in the law">
          <input
            type="checkbox"
            className="checkbox"
            aria-label={`${name} stands in the law`}
            checked={row.inLaw}
            disabled={readOnly}
            onChange={(event) => onChange({ inLaw: event.target.checked })}
          />
        </td>
        <td className="unit">
          <select
            className="select"
            aria-label={`Unit of ${name}`}
            value={row.unit}
            disabled={readOnly}
            onChange={(event) => {
              const unit = CONCENTRATION_UNITS.find(([value]) => value === event.target.value)?.[0];
              if (unit) onChange({ unit });
            }}
          >
            {CONCENTRATION_UNITS.map(([value, words]) => (
              <option key={value} value={value}>
                {words}
              </option>
            ))}
          </select>
        </td>
        <td className="followed">
          {ofReaction ? (
            <input
              type="radio"
              className="radio"
              name="followed"
              aria-label={`Follow ${name}`}
              checked={row.followed}
              disabled={readOnly}
              onChange={onFollow}
            />
          ) : (
            !readOnly && (
              <Button kind="text" className="text-caption" aria-label={`Remove ${name}`} onClick={onRemove}>
                Remove
              </Button>
            )
          )}
        </td>
      </tr>
      {faults.length > 0 && (
        <tr className="fault-row">
          <td colSpan={8} id={faultId} className="text-caption text-stop">
            {faults.map(({ message }) => message).join(" ")}
          </td>
        </tr>
      )}
    </>
  );
}
