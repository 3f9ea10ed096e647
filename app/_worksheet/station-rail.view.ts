import type { Station } from "./station";

/** The rail: the derivation in miniature, a mark and one line per station. */
export interface StationRailItem {
  readonly station: Station;
  readonly name: string;
  /** Worst open check of the station; `empty` where nothing was entered yet. */
  readonly state: "holds" | "note" | "weakens" | "blocks" | "empty";
  /** "A and B, 25.0 °C" */
  readonly yield: string;
}
