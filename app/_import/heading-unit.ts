import { concentrationUnitOf, splitUnit, temperatureUnitOf, timeUnitOf } from "./units";

/**
 * What a heading that is pasted with its block says about the unit of its column. A table in mol/L that lands in a
 * column of mmol/L is wrong by a thousand and looks right, so the heading is read before it is left out.
 *
 * `unit` is the column's, in any writing: "mmol L^-1", "µmol L^-1 s^-1", "°C". A sentence that says how the two
 * disagree; null where they agree, or either names no unit that is known here.
 */
export function headingFault(heading: string, unit: string): string | null {
  const column = readUnit(unit);
  const said = readUnit(heading) ?? readUnit(unitIn(heading));
  if (column === null || said === null || said.kind !== column.kind || said.name === column.name) return null;
  return `The heading “${heading.trim()}” says ${said.name} and the column is in ${column.name}.`;
}

interface NamedUnit {
  readonly kind: "concentration" | "rate" | "temperature";
  readonly name: string;
}

function readUnit(text: string): NamedUnit | null {
  const concentration = concentrationUnitOf(text);
  if (concentration !== null) return { kind: "concentration", name: withMicro(concentration) };
  const temperature = temperatureUnitOf(text);
  if (temperature !== null) return { kind: "temperature", name: temperature === "K" ? "K" : "°C" };
  const rate = rateUnitOf(text);
  return rate === null ? null : { kind: "rate", name: withMicro(rate) };
}

/** "[A]0 (mol/L)" holds "mol/L"; a cell that is nothing but a unit holds itself. */
function unitIn(heading: string): string {
  const split = splitUnit(heading).unit;
  if (split !== "") return split;
  const text = heading.trim();
  const parted = /\s\/\s*(.+)$/.exec(text)?.[1];
  const bracketed = /\s[([](.*)[)\]]$/.exec(text)?.[1];
  return parted ?? bracketed ?? text;
}

/** "mol L-1 s-1", "mol/L/s", "mol/(L·s)", "M/s" and their like as "mol/L/s". */
function rateUnitOf(text: string): string | null {
  const bare = text
    .trim()
    .replace(/^\((.*)\)$/, "$1")
    .replace(/⁻|−/g, "-")
    .replace(/¹/g, "1")
    .replace(/[\s\u00a0\u202f·*^]/g, "")
    .replace(/\/\(L(s|min|h)\)$/, "/L/$1");
  const match = /^(.+?)\/?(s|min|h)(?:-1)?$/.exec(bare);
  const concentration = concentrationUnitOf(match?.[1] ?? "");
  const time = timeUnitOf(match?.[2] ?? "");
  return concentration === null || time === null ? null : `${concentration}/${time}`;
}

function withMicro(unit: string): string {
  return unit.replace(/^umol/, "µmol");
}
