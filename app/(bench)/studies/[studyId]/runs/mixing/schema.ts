import { z } from "zod";
import { base, studyId } from "../../../_change/schema";

const text = z.string().max(200);
const stockId = z.string().min(1).max(64);
const unit = z.enum(["mol/L", "mmol/L", "umol/L"]);

/** The boxes of one stock. Either contents by species id, or a dilution of another stock. */
export const stockForm = z.object({
  symbol: z.string().max(12, "A symbol has at most 12 characters."),
  name: z.string().max(160, "A name has at most 160 characters."),
  unit,
  contents: z.record(z.string().max(64), text),
  /** "" for none. */
  fromStockId: z.string().max(64),
  taken: text,
  mark: text,
  lot: z.string().max(60, "A lot has at most 60 characters."),
  madeOn: z.string().max(40, "At most 40 characters fit here."),
  howKnown: z.string().max(120, "At most 120 characters fit here."),
});

export type StockForm = z.infer<typeof stockForm>;

/** `stockId` null for a new one. */
export const stockInput = z.object({ studyId, base, stockId: stockId.nullable(), form: stockForm });

export const removeStockInput = z.object({ studyId, base, stockId });

export const dispensingForm = z.object({
  unit: z.enum(["uL", "mL"]),
  mark: text,
  upTo: text,
  absolute: text,
  percent: text,
});

export type DispensingForm = z.infer<typeof dispensingForm>;

export const dispensingInput = z.object({ studyId, base, form: dispensingForm });
