import { type ClockForm, readClock } from "./clock";
import type { ColumnRole, Corrections } from "./corrections";
import { lastFilled } from "./frame";
import type { CellFinding, Gathered, GatheredTrace, LineFinding } from "./gathered";
import { GrowingArray } from "./growing-array";
import { type CellReading, type NumberFormat, plainNumber, readCell } from "./number";
import { eachRow, isBlank, type Row, type RowFormat } from "./rows";
import { isSummaryWord } from "./summary-word";

/**
 * One pass over the lines of data: numbers into the traces, everything else into findings with line and column. Cells
 * are not kept, so that memory grows with the readings and not with the text. Times stay in the file's unit here.
 */

export interface GatherOptions {
  readonly rowFormat: RowFormat;
  readonly numberFormat: NumberFormat;
  readonly roles: readonly ColumnRole[];
  /** How clock times of a column are written; null or absent where it holds numbers. */
  readonly clocks: readonly (ClockForm | null)[];
  readonly firstDataLine: number;
  readonly lastDataLine: number | undefined;
  readonly corrections: Corrections;
  /** Readings that may still be stored; one more and the pass stops. */
  readonly pointsLeft: number;
}

const KEPT = 60;

export function gather(text: string, options: GatherOptions): Gathered {
  const pass = new Pass(options);
  eachRow(text, options.rowFormat, (row) => pass.visit(row));
  return pass.result();
}

class Pass {
  private readonly traces = new Map<string, GatheredTrace>();
  private readonly cells: CellFinding[] = [];
  private readonly open = new Map<number, CellFinding[]>();
  private readonly counts = new Map<string, number>();
  private readonly numbers: number[] = [];
  /** Of the line at hand, by column: its number, and what stands there where it is none. */
  private readonly values: number[] = [];
  private readonly oddities: (CellReading | undefined)[] = [];
  private readonly kept = {
    long: [] as LineFinding[],
    short: [] as LineFinding[],
    timeless: [] as LineFinding[],
    words: [] as LineFinding[],
    summary: [] as LineFinding[],
  };
  private readonly count = { long: 0, short: 0, timeless: 0, words: 0, summary: 0, blank: 0 };
  private pending: LineFinding[] = [];
  private pendingCount = { words: 0, blank: 0 };
  private brokenQuotes: number | null = null;
  private lastDataLine = 0;
  private lines = 0;
  private points = 0;
  private tooManyPoints = false;

  private readonly width: number;
  private readonly signals: readonly { column: number; time: number }[];
  private readonly runColumn: number;
  private readonly temperatures: readonly number[];
  private readonly species: readonly { column: number; id: string }[];
  private readonly usedColumns: readonly number[];
  private readonly wide: readonly GatheredTrace[];
  private readonly hasCompanions: boolean;
  private readonly corrected: ReadonlyMap<string, number | null>;
  private readonly leftOut: ReadonlySet<number>;

  constructor(private readonly options: GatherOptions) {
    const { roles, corrections } = options;
    const columnsOf = (role: ColumnRole) =>
      roles.flatMap((other, column) => (other === role ? [column] : []));
    const times = columnsOf("time");
    this.width = roles.length;
    this.signals = columnsOf("signal").flatMap((column) => {
      const time = times.findLast((index) => index < column) ?? times[0];
      return time === undefined ? [] : [{ column, time }];
    });
    this.runColumn = roles.indexOf("run");
    this.temperatures = columnsOf("temperature");
    this.species = roles.flatMap((role, column) =>
      role.startsWith("species:") ? [{ column, id: role.slice("species:".length) }] : [],
    );
    this.usedColumns = [...times, ...this.signals.map(({ column }) => column)];
    this.corrected = new Map(
      (corrections.cells ?? []).map((cell) => [`${cell.line}:${cell.column}`, cell.as]),
    );
    this.leftOut = new Set(corrections.linesLeftOut ?? []);
    // Columns of a wide table keep their place even when they turn out empty.
    this.wide =
      this.runColumn < 0 ? this.signals.map(({ column }) => this.trace(`c${column}`, column, null)) : [];
    this.hasCompanions = this.temperatures.length + this.species.length > 0;
  }

  visit(row: Row): boolean {
    this.lines = row.line;
    if (row.brokenQuotes) this.brokenQuotes ??= row.line;
    const { firstDataLine, lastDataLine } = this.options;
    if (row.line < firstDataLine || this.leftOut.has(row.line)) return true;
    if (isBlank(row)) {
      this.pendingCount.blank += 1;
      return true;
    }
    if (lastDataLine !== undefined && row.line > lastDataLine) {
      this.pend(row);
      return true;
    }
    if (!this.readUsed(row)) {
      this.pend(row);
      return true;
    }
    if (this.isSummary(row)) {
      this.keep("summary", row);
      return true;
    }
    this.flushPending();
    this.lastDataLine = row.line;
    this.checkWidth(row);
    this.take(row);
    if (this.points > this.options.pointsLeft) {
      this.tooManyPoints = true;
      return false;
    }
    return true;
  }

  /** Reads the time and signal cells; false where the line holds nothing that a line of data would. */
  private readUsed(row: Row): boolean {
    let isData = false;
    for (const column of this.usedColumns) {
      const value =
        this.corrected.size === 0
          ? plainNumber(row.cells[column] ?? "", this.options.numberFormat)
          : Number.NaN;
      this.values[column] = value;
      this.oddities[column] = undefined;
      if (!Number.isNaN(value)) {
        isData = true;
        continue;
      }
      const reading = this.read(row, column);
      if (reading.kind === "number") this.values[column] = reading.value;
      else this.oddities[column] = reading;
      // A line whose words are all 'no reading' is still a line of data.
      isData ||=
        reading.kind === "number" ||
        reading.kind === "ambiguous" ||
        reading.kind === "flagged" ||
        reading.kind === "no-reading";
    }
    return isData;
  }

  /** Read already. Statistics stand where a time would, and no line of data has a word there. */
  private isSummary(row: Row): boolean {
    const timed = this.signals.some(({ time }) => this.oddities[time] === undefined);
    return !timed && isSummaryWord(row.cells.find((cell) => cell !== "") ?? "");
  }

  private read(row: Row, column: number): CellReading {
    const said = this.corrected.get(`${row.line}:${column}`);
    if (said === null) return { kind: "empty" };
    if (said !== undefined) return { kind: "number", value: said };
    const cell = row.cells[column] ?? "";
    const form = this.options.clocks[column];
    const clock = form ? readClock(cell, form) : null;
    if (clock !== null) return { kind: "number", value: clock };
    const reading = readCell(cell, this.options.numberFormat);
    const { flaggedCells } = this.options.corrections;
    if (reading.kind !== "flagged" || flaggedCells === undefined) return reading;
    return flaggedCells === "read" ? { kind: "number", value: reading.asNumber } : { kind: "empty" };
  }

  private take(row: Row): void {
    for (const column of this.usedColumns) {
      const oddity = this.oddities[column];
      if (oddity === undefined) this.countNumber(column);
      else if (oddity.kind !== "number" && oddity.kind !== "empty") this.find(row, column, oddity);
    }
    const runName = this.runColumn < 0 ? null : (row.cells[this.runColumn] ?? "");
    let timeless = false;
    for (const [position, { column, time }] of this.signals.entries()) {
      const trace =
        runName === null ? this.wide[position] : this.trace(`r:${runName.slice(0, 76)}`, column, runName);
      if (trace === undefined) continue;
      const value = this.oddities[column];
      const at = this.oddities[time];
      if (value === undefined && at === undefined) {
        trace.time.push(this.values[time] ?? 0);
        trace.signal.push(this.values[column] ?? 0);
        trace.line.push(row.line);
        this.points += 1;
        if (this.hasCompanions) this.takeCompanions(row, trace);
      } else if (value === undefined && at?.kind === "empty") {
        timeless ||= this.corrected.get(`${row.line}:${time}`) !== null;
      } else if (value?.kind === "empty") trace.empty += 1;
    }
    if (timeless) this.keep("timeless", row);
  }

  private countNumber(column: number): void {
    this.numbers[column] = (this.numbers[column] ?? 0) + 1;
    const waiting = this.open.get(column);
    if (waiting === undefined) return;
    for (const cell of waiting) cell.after = this.values[column] ?? null;
    this.open.delete(column);
  }

  private takeCompanions(row: Row, trace: GatheredTrace): void {
    for (const column of this.temperatures) {
      const reading = this.read(row, column);
      if (reading.kind !== "number") continue;
      trace.temperature.sum += reading.value;
      trace.temperature.count += 1;
    }
    for (const { column, id } of this.species) {
      const reading = this.read(row, column);
      if (reading.kind !== "number") continue;
      const known = trace.concentrations.get(id);
      if (!known) trace.concentrations.set(id, { value: reading.value, line: row.line, varies: null });
      else if (known.varies === null && known.value !== reading.value) known.varies = row.line;
    }
  }

  private trace(source: string, column: number, runName: string | null): GatheredTrace {
    const known = this.traces.get(source);
    if (known) return known;
    const trace: GatheredTrace = {
      source,
      column,
      runName,
      time: new GrowingArray(),
      signal: new GrowingArray(),
      line: new GrowingArray(),
      concentrations: new Map(),
      temperature: { sum: 0, count: 0 },
      empty: 0,
    };
    this.traces.set(source, trace);
    return trace;
  }

  private find(row: Row, column: number, reading: CellFinding["reading"]): void {
    const key = `${column}:${reading.kind}`;
    const count = (this.counts.get(key) ?? 0) + 1;
    this.counts.set(key, count);
    if (count > KEPT) return;
    const trace = this.traces.get(`c${column}`);
    const cell: CellFinding = {
      line: row.line,
      column,
      text: row.cells[column] ?? "",
      reading,
      before: trace?.signal.last() ?? null,
      after: null,
    };
    this.cells.push(cell);
    this.open.set(column, [...(this.open.get(column) ?? []), cell]);
  }

  private checkWidth(row: Row): void {
    const filled = lastFilled(row.cells) + 1;
    if (filled > this.width) this.keep("long", row, filled);
    else if (row.cells.length < this.width && this.usedColumns.some((column) => column >= row.cells.length)) {
      this.keep("short", row);
    }
  }

  private keep(kind: keyof typeof this.kept, row: Row, cells = row.cells.length): void {
    this.count[kind] += 1;
    if (this.kept[kind].length < KEPT) this.kept[kind].push(lineFinding(row, cells));
  }

  private pend(row: Row): void {
    this.pendingCount.words += 1;
    if (this.pending.length < KEPT) this.pending.push(lineFinding(row, row.cells.length));
  }

  private flushPending(): void {
    this.count.words += this.pendingCount.words;
    this.count.blank += this.pendingCount.blank;
    this.kept.words.push(...this.pending.slice(0, KEPT - this.kept.words.length));
    this.pending = [];
    this.pendingCount = { words: 0, blank: 0 };
  }

  result(): Gathered {
    return {
      traces: [...this.traces.values()],
      cells: this.cells,
      counts: this.counts,
      numbers: this.numbers,
      longLines: this.kept.long,
      longLineCount: this.count.long,
      shortLines: this.kept.short,
      shortLineCount: this.count.short,
      timeless: this.kept.timeless,
      timelessCount: this.count.timeless,
      wordLines: this.kept.words,
      wordLineCount: this.count.words,
      blankLineCount: this.count.blank,
      tail: this.pending,
      tailCount: this.pendingCount.words,
      summaries: this.kept.summary,
      summaryCount: this.count.summary,
      brokenQuotes: this.brokenQuotes,
      lastDataLine: this.lastDataLine,
      lines: this.lines,
      tooManyPoints: this.tooManyPoints,
    };
  }
}

function lineFinding(row: Row, cells: number): LineFinding {
  return {
    line: row.line,
    text: row.cells
      .filter((cell) => cell !== "")
      .join(" ")
      .slice(0, 80),
    cells,
  };
}
