import type { Portion, Total } from "./mixing";

/**
 * Concentrations of one solution with the effect of every source on them, species by index. An effect is the change in
 * mol/L for one standard deviation of the source, with its sign.
 */
export interface Propagated {
  readonly concentrations: Float64Array;
  readonly effects: ReadonlyMap<number, Float64Array>;
}

/** Makes sources, and says under which index the calibration of a device stands. */
export interface SourceBook {
  /** A new source of the row at hand; null where it is exact. */
  readonly ownSource: () => number;
  readonly deviceSource: (device: string) => { readonly source: number; readonly relative: number } | null;
}

/**
 * c_i = Σ_j C_ij V_j/V. With V the mark, ∂c_i/∂V_j = C_ij/V and ∂c_i/∂V = −c_i/V; with V = ΣV_j,
 * ∂c_i/∂V_j = (C_ij − c_i)/V, so that a device that delivers every portion cancels. What the parts carry already is
 * carried on with the share V_j/V that each of them has.
 */
export function mixed(
  species: number,
  parts: readonly { readonly portion: Portion; readonly from: Propagated | null }[],
  total: Total,
  totalVolume: number,
  book: SourceBook,
): Propagated {
  const concentrations = new Float64Array(species);
  const effects = new Map<number, Float64Array>();
  const add = (source: number, size: number, change: (i: number) => number) => {
    const effect = effects.get(source) ?? new Float64Array(species);
    for (let i = 0; i < species; i++) effect[i] = (effect[i] ?? 0) + size * change(i);
    effects.set(source, effect);
  };

  for (const { portion, from } of parts) {
    const share = portion.volume / totalVolume;
    for (let i = 0; i < species; i++)
      concentrations[i] =
        (concentrations[i] ?? 0) + ((from?.concentrations[i] ?? 0) * portion.volume) / totalVolume;
    for (const [source, effect] of from?.effects ?? []) add(source, share, (i) => effect[i] ?? 0);
  }

  const volumes = parts.map(({ portion, from }) => ({
    measured: portion,
    perVolume: (i: number) =>
      ((from?.concentrations[i] ?? 0) - (total.kind === "sum" ? (concentrations[i] ?? 0) : 0)) / totalVolume,
  }));
  if (total.kind === "mark")
    volumes.push({
      measured: { ...total, solution: null },
      perVolume: (i: number) => -(concentrations[i] ?? 0) / totalVolume,
    });
  for (const { measured, perVolume } of volumes) {
    const { volume, standardUncertainty = 0, device } = measured;
    if (standardUncertainty > 0) add(book.ownSource(), standardUncertainty, perVolume);
    const calibration = device === undefined ? null : book.deviceSource(device);
    if (calibration !== null) add(calibration.source, calibration.relative * volume, perVolume);
  }
  return { concentrations, effects };
}
