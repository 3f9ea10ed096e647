/**
 * The records of a JCAMP-DX file: `##LABEL= value`, the value running on to the next label. R. S. McDonald and P. A.
 * Wilks, Applied Spectroscopy 42 (1988) 151 (JCAMP-DX 4.24).
 */
export interface LabelledRecord {
  /** Upper case, without the blanks, dashes, slashes and underscores that the format passes over. */
  readonly label: string;
  /** 1-based line of the label. */
  readonly line: number;
  /** What follows the equals sign on the label's own line, then the lines after it; comments taken out. */
  readonly lines: readonly string[];
}

export function isJcamp(text: string): boolean {
  return /^\s*##\s*TITLE\s*=/i.test(text);
}

export function labelledRecords(text: string): LabelledRecord[] {
  const records: { label: string; line: number; lines: string[] }[] = [];
  text.split("\n").forEach((whole, index) => {
    const line = whole.replace(/\$\$.*$/, "");
    const start = /^\s*##([^=]*)=(.*)$/.exec(line);
    if (start) {
      const label = (start[1] ?? "").toUpperCase().replace(/[\s\-/_]/g, "");
      records.push({ label, line: index + 1, lines: [(start[2] ?? "").trim()] });
    } else {
      records.at(-1)?.lines.push(line);
    }
  });
  return records.filter(({ label }) => label !== "");
}

/** One data set: the records from its title to its end. */
export interface DataBlock {
  readonly title: string;
  readonly records: ReadonlyMap<string, LabelledRecord>;
}

/** Blocks that hold data; a block of links only holds others. */
export function dataBlocks(records: readonly LabelledRecord[]): DataBlock[] {
  const open: Map<string, LabelledRecord>[] = [];
  const blocks: DataBlock[] = [];
  const close = (block: Map<string, LabelledRecord> | undefined) => {
    if (block && [...block.keys()].some((label) => DATA_LABELS.has(label))) {
      blocks.push({ title: recordText(block, "TITLE"), records: block });
    }
  };
  for (const record of records) {
    if (record.label === "TITLE") open.push(new Map());
    if (record.label === "END") close(open.pop());
    else if (!open.at(-1)?.has(record.label)) open.at(-1)?.set(record.label, record);
  }
  // A file cut off before its END still shows what it holds; the number of points tells whether all came.
  for (const block of open.reverse()) close(block);
  return blocks;
}

const DATA_LABELS = new Set(["XYDATA", "XYPOINTS", "PEAKTABLE", "NTUPLES", "RADATA"]);

export function recordText(records: ReadonlyMap<string, LabelledRecord>, label: string): string {
  return records.get(label)?.lines[0]?.trim() ?? "";
}

/** null where the record is absent or holds no number. */
export function recordNumber(records: ReadonlyMap<string, LabelledRecord>, label: string): number | null {
  const text = recordText(records, label).replace(",", ".");
  return text !== "" && Number.isFinite(Number(text)) ? Number(text) : null;
}
