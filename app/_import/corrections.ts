import { z } from "zod";

/**
 * What a person said about a file, over what the reader guessed. Corrections never touch the raw bytes: the file is
 * read again from them each time, and they are kept in words with the upload.
 */

const columnRole = z.union([
  z.enum(["time", "signal", "run", "temperature", "left-out"]),
  z.templateLiteral(["species:", z.string().min(1).max(64)]),
]);

const line = z.number().int().positive();

const cellCorrection = z.object({
  line,
  /** 0-based, as in the file. */
  column: z.number().int().nonnegative().max(4999),
  /** The number that stands there, or null to leave the cell out. */
  as: z.number().nullable(),
});

export const corrections = z.object({
  /** Of a workbook. */
  sheet: z.string().max(100).optional(),
  encoding: z.enum(["utf-8", "utf-16le", "utf-16be", "windows-1252"]).optional(),
  separator: z.enum([",", ";", "\t", "|", " "]).optional(),
  arrangement: z.enum(["as-it-stands", "blocks", "turned"]).optional(),
  quotes: z.enum(["quoting", "plain"]).optional(),
  decimalMark: z.enum([".", ",", "either"]).optional(),
  /** null: the file has no such line. */
  headerLine: line.nullable().optional(),
  unitLine: line.nullable().optional(),
  firstDataLine: line.optional(),
  lastDataLine: line.optional(),
  /** By 0-based column number. */
  columns: z.record(z.string().regex(/^\d{1,4}$/), columnRole).optional(),
  /** By the trace's source, see TraceReading. */
  labels: z.record(z.string().max(80), z.string().trim().min(1).max(40)).optional(),
  /** What two parts of a clock mean: 10:02. */
  clockForm: z.enum(["hours-minutes", "minutes-seconds"]).optional(),
  clockZero: z.enum(["first-reading", "as-written"]).optional(),
  timeUnit: z.enum(["ms", "s", "min", "h"]).optional(),
  signalUnit: z.enum(["mol/L", "mmol/L", "umol/L", "as-set-up", "thousandths"]).optional(),
  temperatureUnit: z.enum(["degC", "K"]).optional(),
  cells: z.array(cellCorrection).max(2000).optional(),
  unreadableCells: z.literal("left-out").optional(),
  flaggedCells: z.enum(["read", "left-out"]).optional(),
  linesLeftOut: z.array(line).max(2000).optional(),
  repeatedTimes: z.enum(["first", "mean"]).optional(),
  timeOrder: z.literal("sorted").optional(),
});

export type ColumnRole = z.infer<typeof columnRole>;
export type Corrections = z.infer<typeof corrections>;
export type CellCorrection = z.infer<typeof cellCorrection>;
