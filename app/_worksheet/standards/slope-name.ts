import type { Sheet } from "@/db/sheet/sheet.schema";

/** "ε·l" of an absorbance, "slope" of any other signal. */
export function slopeName({ signal }: Pick<Sheet, "signal">): string {
  return signal?.kind === "calibrated" && /^absorb/i.test(signal.quantity.trim()) ? "ε·l" : "slope";
}

/** Of signal per concentration, plain text for typesetting: "L mol^-1", "mS L mol^-1". */
export function slopeUnit({ signal }: Pick<Sheet, "signal">): string {
  const unit = signal?.kind === "calibrated" ? signal.unit.trim() : "";
  return unit === "" ? "L mol^-1" : `${unit} L mol^-1`;
}
