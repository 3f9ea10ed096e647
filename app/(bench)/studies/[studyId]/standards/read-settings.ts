import { concentrationToMolar } from "kinetics-core/quantities";
import type { z } from "zod";
import type { FieldMessage } from "@/app/_server/action-result";
import { parseNumber } from "@/app/_worksheet/typed-number/parse-number";
import type { CalibrationSettings } from "@/db/sheet/sheet.schema";
import type { settingsInput } from "./schema";

/** How the line is drawn, read from its boxes; the range in mol L⁻¹, null at an end that was left open. */
export type ReadSettings =
  | {
      readonly status: "read";
      readonly settings: Pick<CalibrationSettings, "intercept" | "weighting" | "stockRelative"> & {
        readonly low: number | null;
        readonly high: number | null;
      };
    }
  | { readonly status: "faults"; readonly faults: readonly FieldMessage[] };

export function readSettings(input: z.output<typeof settingsInput>): ReadSettings {
  const faults: FieldMessage[] = [];
  const read = (path: "low" | "high" | "stock"): number | null => {
    const reading = parseNumber(input[path]);
    if (reading.status === "empty") return null;
    if (reading.status === "not-a-number") {
      faults.push({ path, message: reading.message });
      return null;
    }
    if (reading.value < 0)
      faults.push({ path, message: "It is negative. Write 0 or more, or leave it empty." });
    return reading.value;
  };
  const [low, high, percent] = [read("low"), read("high"), read("stock")];
  if (low !== null && high !== null && !(low < high))
    faults.push({ path: "high", message: "The range ends before it begins. Set its end above its start." });
  if (percent !== null && percent > 100)
    faults.push({ path: "stock", message: "It is a part of the concentration. Write 0 to 100 %." });
  if (faults.length > 0) return { status: "faults", faults };
  const molar = (typed: number | null) => (typed === null ? null : concentrationToMolar(typed, input.unit));
  return {
    status: "read",
    settings: {
      intercept: input.intercept,
      weighting: input.weighting,
      stockRelative: (percent ?? 0) / 100,
      low: molar(low),
      high: molar(high),
    },
  };
}
