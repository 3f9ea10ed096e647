import { randomDraws } from "kinetics-core/random";
import type { AnySection, Columns } from "./section";

/** Replicates [from, to) of one cell. Each has a seed of its own, so that no split among workers changes a figure. */
export function simulateReplicates(section: AnySection, cell: number, from: number, to: number): Columns {
  const simulate = section.prepare(cell);
  const first = seedOf(`${section.name}/${section.cellNames[cell] ?? ""}`);
  const columns: Record<string, Float64Array> = {};
  for (let replicate = from; replicate < to; replicate++) {
    const outcome = simulate(randomDraws((first + replicate) | 0));
    for (const [name, value] of Object.entries(outcome)) {
      columns[name] ??= new Float64Array(to - from).fill(Number.NaN);
      columns[name][replicate - from] = value;
    }
  }
  return columns;
}

/** Parts of one cell, in order, as one. */
export function joinColumns(parts: readonly Columns[]): Columns {
  const names = [...new Set(parts.flatMap((part) => Object.keys(part)))];
  return Object.fromEntries(
    names.map((name) => [name, Float64Array.from(parts.flatMap((part) => [...(part[name] ?? [])]))]),
  );
}

/** FNV-1a of the cell's name, 32 bits: a cell keeps its seed when others come and go. */
function seedOf(name: string): number {
  let hash = 0x811c9dc5;
  for (let i = 0; i < name.length; i++) hash = Math.imul(hash ^ name.charCodeAt(i), 0x01000193);
  return hash | 0;
}
