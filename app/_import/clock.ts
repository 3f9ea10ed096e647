/**
 * Times as clocks and loggers write them: 10:02:11.25, 1:02:11 PM, 26:15:00, 2026-03-01T10:02:11Z, 01.03.2026
 * 10:02:11. They become seconds that may only be compared within one column; traces count from their own first reading.
 */

/** `moment`: date and time by ISO 8601; `clock`: a time of day or a span; the rest say how two parts are meant. */
export type ClockForm = "moment" | "clock" | "hours-minutes" | "minutes-seconds";

/** Two parts, 10:02, may be hours and minutes or minutes and seconds. */
export type ClockKind = "moment" | "clock" | "two-parts";

const ISO = /^(\d{4}-\d{2}-\d{2})[T ](\d{1,2}):(\d{2})(?::(\d{2}(?:[.,]\d+)?))?\s*(Z|[+-]\d{2}:?\d{2})?$/;
const DATE_BEFORE = /^\d{1,4}[./-]\d{1,2}[./-]\d{1,4}[T ,]+/;
const CLOCK = /^(\d{1,4}):(\d{2})(?::(\d{2}))?([.,]\d+)?\s*([AaPp]\.?[Mm]\.?)?$/;
const DAY = 86_400;

/** null: no clock stands here. */
export function clockKind(cell: string): ClockKind | null {
  if (ISO.test(cell)) return "moment";
  const parts = CLOCK.exec(cell.replace(DATE_BEFORE, ""));
  if (parts === null || Number(parts[2]) > 59 || Number(parts[3] ?? 0) > 59) return null;
  // A fraction belongs to seconds, AM and PM to hours.
  if (parts[3] !== undefined || parts[5] !== undefined || DATE_BEFORE.test(cell)) return "clock";
  return "two-parts";
}

/** How a column is written, when at least nine of ten of its entries are clocks; null when it is no column of clocks. */
export function clockOfColumn(cells: readonly string[]): ClockKind | null {
  const kinds = cells.map(clockKind);
  const found = kinds.filter((kind) => kind !== null);
  if (found.length < 2 || found.length < 0.9 * cells.length) return null;
  if (found.every((kind) => kind === "moment")) return "moment";
  return found.every((kind) => kind === "two-parts") ? "two-parts" : "clock";
}

/** Whether two parts can only be minutes and seconds: no day has so many hours, and hours have no fraction. */
export function isMinutesSeconds(cells: readonly string[]): boolean {
  return cells.some((cell) => {
    const parts = CLOCK.exec(cell);
    return parts !== null && (Number(parts[1]) > 23 || parts[4] !== undefined);
  });
}

/** Seconds, from a point that all cells of the column share; null where the cell is no such clock. */
export function readClock(cell: string, form: ClockForm): number | null {
  if (form === "moment") return momentSeconds(cell);
  const parts = CLOCK.exec(cell.replace(DATE_BEFORE, ""));
  if (parts === null || clockKind(cell) === null) return null;
  const [, first = "0", second = "0", third, fraction = "", half] = parts;
  const part = fraction === "" ? 0 : Number(`0.${fraction.slice(1)}`);
  if (third === undefined && form !== "hours-minutes" && half === undefined && !DATE_BEFORE.test(cell)) {
    return Number(first) * 60 + Number(second) + part;
  }
  const hours = half === undefined ? Number(first) : (Number(first) % 12) + (/^p/i.test(half) ? 12 : 0);
  return hours * 3600 + Number(second) * 60 + Number(third ?? 0) + part;
}

function momentSeconds(cell: string): number | null {
  const parts = ISO.exec(cell);
  if (parts === null) return null;
  const [, date = "", hours = "", minutes = "", seconds = "0", zone = "Z"] = parts;
  const [whole = "0", fraction = ""] = seconds.replace(",", ".").split(".");
  const day = Date.parse(`${date}T00:00:00Z`);
  // A 31 February is read as 3 March by some engines; it is a fault of the file.
  if (Number.isNaN(day) || !new Date(day).toISOString().startsWith(date)) return null;
  const offset = zone === "Z" || zone.includes(":") ? zone : `${zone.slice(0, 3)}:${zone.slice(3)}`;
  const stamp = Date.parse(`${date}T${hours.padStart(2, "0")}:${minutes}:${whole.padStart(2, "0")}${offset}`);
  return Number.isNaN(stamp) ? null : stamp / 1000 + (fraction === "" ? 0 : Number(`0.${fraction}`));
}

export interface Elapsed {
  /** Seconds from the first reading, to the microsecond. */
  readonly time: Float64Array;
  /** Times of day that passed midnight, where a day was added. */
  readonly midnights: number;
}

/** Counted from the first reading. A time of day that falls back by more than half a day has passed midnight. */
export function elapsedSeconds(clock: Float64Array, form: ClockForm): Elapsed {
  const first = clock[0] ?? 0;
  let days = 0;
  const time = clock.map((value, i) => {
    const before = clock[i - 1];
    if (form !== "moment" && before !== undefined && before - value > DAY / 2) days += 1;
    return Math.round((value + days * DAY - first) * 1e6) / 1e6;
  });
  return { time, midnights: days };
}
