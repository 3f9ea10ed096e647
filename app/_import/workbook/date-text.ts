/** A workbook's dates begin here; what lies before 1 March 1900 is a time of day or a span, not a day. */
const FIRST_DAY = Date.UTC(1899, 11, 30);
const FIRST_REAL_DAY = Date.UTC(1900, 2, 1);

/**
 * A cell formatted as date or time, as text that the reader of times knows: "26:15:00" for a span or a time of day,
 * "2026-03-01T10:02:11.25" for a moment. Workbooks keep times to about a microsecond; milliseconds are what is told.
 */
export function dateText(date: Date): string {
  const milliseconds = Math.round(date.getTime());
  if (milliseconds >= FIRST_REAL_DAY) {
    const iso = new Date(milliseconds).toISOString();
    return iso.endsWith("T00:00:00.000Z") ? iso.slice(0, 10) : iso.replace(/\.?0*Z$/, "");
  }
  const span = milliseconds - FIRST_DAY;
  const sign = span < 0 ? "-" : "";
  const whole = Math.floor(Math.abs(span) / 1000);
  const rest = Math.abs(span) % 1000;
  const two = (value: number) => String(value).padStart(2, "0");
  const fraction = rest === 0 ? "" : `.${String(rest).padStart(3, "0").replace(/0+$/, "")}`;
  return `${sign}${two(Math.floor(whole / 3600))}:${two(Math.floor(whole / 60) % 60)}:${two(whole % 60)}${fraction}`;
}
