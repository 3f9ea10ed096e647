import type { Block } from "./clipboard-block";
import type { GridColumn, GridPosition } from "./grid-shape";

/** What pasting a block would do, decided before any cell changes: one paste is one step, or nothing at all. */
export type PastePlan =
  | {
      readonly status: "planned";
      /** Rows from `rowCount` on are new. */
      readonly cells: readonly { readonly row: number; readonly column: number; readonly text: string }[];
      readonly newRows: number;
      readonly skippedHeadLines: number;
      readonly skippedComputedCells: number;
      /** Headings that name no column, where the block went by its headings. */
      readonly skippedHeadings: readonly string[];
    }
  | { readonly status: "refused"; readonly message: string };

export interface PasteTarget {
  readonly columns: readonly GridColumn[];
  readonly rowCount: number;
  readonly from: GridPosition;
  /** Rows that may be added below. */
  readonly roomForNewRows: number;
}

const MOST_HEAD_LINES = 3;

export function planPaste(block: Block, { columns, rowCount, from, roomForNewRows }: PasteTarget): PastePlan {
  const width = Math.max(0, ...block.map((row) => row.length));
  if (width === 0) return { status: "refused", message: "The clipboard holds no text to paste." };
  const named = namedColumns(block, columns);
  const room = columns.length - from.column;
  if (named === null && width > room) {
    return {
      status: "refused",
      message: `The block is ${count(width, "column")} wide and ${count(room, "column")} ${room === 1 ? "is" : "are"} left from ${columns[from.column]?.label ?? "here"} on. Nothing was pasted; start further left, or copy fewer columns.`,
    };
  }
  const placed = named?.places ?? Array.from({ length: width }, (_, offset) => from.column + offset);
  const skippedHeadLines = Math.max(named === null ? 0 : 1, headLines(block, columns, placed));
  const fault = headingFault(block.slice(0, skippedHeadLines), columns, placed);
  if (fault !== null) {
    return {
      status: "refused",
      message: `${fault} Nothing was pasted; convert the values and their heading, or change the unit in Set-up.`,
    };
  }
  const body = block.slice(skippedHeadLines);
  const newRows = Math.max(0, from.row + body.length - rowCount);
  if (newRows > roomForNewRows) {
    return {
      status: "refused",
      message: `The block has ${count(body.length, "row")} and there is room for ${rowCount - from.row + roomForNewRows}. Nothing was pasted.`,
    };
  }
  let skippedComputedCells = 0;
  const cells = body.flatMap((texts, rowOffset) =>
    texts.flatMap((text, columnOffset) => {
      const column = placed[columnOffset] ?? null;
      if (column === null) return [];
      if (columns[column]?.readOnly) {
        if (text !== "") skippedComputedCells += 1;
        return [];
      }
      return [{ row: from.row + rowOffset, column, text }];
    }),
  );
  return {
    status: "planned",
    cells,
    newRows,
    skippedHeadLines,
    skippedComputedCells,
    skippedHeadings: named?.unknown ?? [],
  };
}

/** Lines at the top that hold words where the rows below hold numbers: names of columns, then perhaps units. */
function headLines(block: Block, columns: readonly GridColumn[], placed: readonly (number | null)[]): number {
  const numeric = placed.flatMap((column, index) =>
    column !== null && columns[column]?.kind === "number" ? [index] : [],
  );
  const isWords = (row: readonly string[]) => {
    const texts = numeric.map((index) => row[index] ?? "").filter((text) => text !== "");
    return texts.length > 0 ? texts.every((text) => !startsAsNumber(text)) : null;
  };
  let lines = 0;
  while (lines < MOST_HEAD_LINES && lines < block.length - 1 && isWords(block[lines] ?? []) === true)
    lines += 1;
  return block.slice(lines).some((row) => isWords(row) === false) ? lines : 0;
}

function headingFault(
  heads: Block,
  columns: readonly GridColumn[],
  placed: readonly (number | null)[],
): string | null {
  for (const texts of heads) {
    for (const [offset, text] of texts.entries()) {
      const fault = columns[placed[offset] ?? -1]?.headingFault?.(text) ?? null;
      if (fault !== null) return fault;
    }
  }
  return null;
}

/** Two names make a block go by its headings; one could be a word that happens to stand there. */
const FEWEST_NAMES = 2;

/**
 * Where the columns of a block go by the names in its first line: place in the grid, or null for a heading that names
 * none. Null where too few are named, or one column twice: the block then goes by place.
 */
function namedColumns(
  block: Block,
  columns: readonly GridColumn[],
): { readonly places: readonly (number | null)[]; readonly unknown: readonly string[] } | null {
  const [heads = []] = block;
  if (block.length < 2) return null;
  const places = heads.map((head) => {
    const place = head === "" ? -1 : columns.findIndex((column) => column.isNamed?.(head) === true);
    return place < 0 ? null : place;
  });
  const found = places.filter((place) => place !== null);
  if (found.length < FEWEST_NAMES || new Set(found).size < found.length) return null;
  return { places, unknown: heads.filter((head, index) => head !== "" && places[index] === null) };
}

function startsAsNumber(text: string): boolean {
  return /^[+\-−]?[.,]?\d/.test(text);
}

function count(number: number, noun: string): string {
  return `${number} ${noun}${number === 1 ? "" : "s"}`;
}
