import { canonicalJson, sha256Of } from "@/db/canonical-json";
import { type Corrections, corrections as correctionsSchema } from "./corrections";
import type { FileReading } from "./reading";

/**
 * What is worth remembering of how a file was read, by its heading: what its columns are, its units and marks. What
 * belongs to one file alone (cells, lines, labels) and what belongs to one study (its species) is not.
 */

/** The same for files whose columns have the same names and units, whatever they hold; null without a heading. */
export function headingHash({
  container,
  columns,
}: Pick<FileReading, "container" | "columns">): string | null {
  const named = columns.some(({ name }) => name !== "");
  return named ? sha256Of(canonicalJson([container, columns.map(({ name, unit }) => [name, unit])])) : null;
}

/** The part of `corrections` that another file of the heading can be read by; null where nothing was said. */
export function layoutOf(corrections: Corrections): Corrections | null {
  const { encoding, separator, quotes, decimalMark, arrangement, timeUnit, signalUnit, temperatureUnit } =
    corrections;
  const { clockForm, clockZero } = corrections;
  const columns = Object.fromEntries(
    Object.entries(corrections.columns ?? {}).filter(([, role]) => !role.startsWith("species:")),
  );
  const said = Object.fromEntries(
    Object.entries({
      encoding,
      separator,
      quotes,
      decimalMark,
      arrangement,
      timeUnit,
      signalUnit,
      temperatureUnit,
      clockForm,
      clockZero,
      ...(Object.keys(columns).length > 0 ? { columns } : {}),
    }).filter(([, value]) => value !== undefined),
  );
  return Object.keys(said).length === 0 ? null : correctionsSchema.parse(said);
}

/** A remembered layout, where it still is one and says more than what was said already. */
export function offeredLayout(remembered: unknown, said: Corrections): Corrections | null {
  const parsed = correctionsSchema.safeParse(remembered);
  if (!parsed.success || layoutOf(said) !== null) return null;
  return layoutOf(parsed.data);
}
