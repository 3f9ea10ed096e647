import { MARK, readMixingCells, VOLUME, VOLUME_UNITS } from "../_mixing/mixing-row";
import { CONCENTRATION, type Mixture, mixturesOf } from "../_mixing/mixture";
import type { MixingGridView } from "./mixing-grid.view";

type Cells = Readonly<Record<string, string>>;

/** What the texts of a row come to while they are typed; null where a volume is not read yet. */
export function typedMixture(view: MixingGridView, cells: Cells): Mixture | null {
  const volumes = Object.fromEntries(
    Object.entries(cells).filter(([column]) => column.startsWith(VOLUME) || column === MARK),
  );
  const { faults, edit } = readMixingCells(volumes, null, view.shape);
  if (Object.keys(faults).length > 0) return null;
  const run = {
    label: cells.label?.trim() || "The new run",
    volumes: edit.volumes ?? {},
    markMicrolitre: edit.markMicrolitre ?? null,
  };
  return mixturesOf(view.preparation, [run])[0] ?? null;
}

/** One sentence on the cell being typed: "600 µL gives [A]₀ 50.0 ± 0.4 µmol L⁻¹, 3000 µL in all." */
export function typedWords(view: MixingGridView, cells: Cells, columnId: string, text: string): string {
  const fault = readMixingCells({ [columnId]: text }, null, view.shape).faults[columnId];
  if (fault !== undefined) return fault;
  if (text.trim() === "") return "Empty.";
  if (!columnId.startsWith(VOLUME) && columnId !== MARK) return `${text.trim()}.`;
  const mixture = typedMixture(view, { ...cells, [columnId]: text });
  const unit = VOLUME_UNITS[view.shape.unit];
  if (mixture === null || mixture.status === "empty") return `${text.trim()} ${unit}.`;
  if (mixture.status === "refused") return `${mixture.refusal.title}.`;
  const parts = view.columns.flatMap(({ id, label, unit: shown }) => {
    const given = id.startsWith(CONCENTRATION)
      ? mixture.concentrations[id.slice(CONCENTRATION.length)]
      : undefined;
    return given === undefined ? [] : [`${label} ${given} ${shown.replaceAll("^-1", "⁻¹")}`];
  });
  return `${text.trim()} ${unit} gives ${[...parts, `${mixture.total} ${unit} in all`].join(", ")}.`;
}
