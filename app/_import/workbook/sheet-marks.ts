/**
 * What a workbook's XML says beside the values: which sheets there are, what is hidden, where formulas stand. Only
 * marks are looked for, never values, so a few patterns do; prefixes such as `x:` before a name are allowed for.
 */

export interface SheetEntry {
  readonly name: string;
  readonly hidden: boolean;
  /** Path of its part in the archive; null where the workbook does not say. */
  readonly part: string | null;
}

export interface SheetMarks {
  /** 0-based. */
  readonly hiddenColumns: readonly number[];
  /** 1-based rows. */
  readonly hiddenRows: readonly number[];
  /** 0-based columns that hold a formula. */
  readonly formulaColumns: readonly number[];
  /** "D7": formulas whose value was not saved with the workbook. */
  readonly withoutValue: readonly string[];
}

/** A column beyond this is no column of a bench's table, however wide a hidden stretch is declared. */
const LAST_COLUMN = 5000;

export function sheetEntries(parts: ReadonlyMap<string, Uint8Array>): SheetEntry[] {
  const workbook = textOf(parts, "xl/workbook.xml");
  const relations = new Map(
    elements(textOf(parts, "xl/_rels/workbook.xml.rels"), "Relationship").map((tag) => [
      attribute(tag, "Id") ?? "",
      attribute(tag, "Target") ?? "",
    ]),
  );
  return elements(workbook, "sheet").map((tag) => {
    const target = relations.get(attribute(tag, "(?:\\w+:)?id") ?? "");
    const part = target === undefined ? null : target.startsWith("/") ? target.slice(1) : `xl/${target}`;
    return {
      name: attribute(tag, "name") ?? "",
      hidden: /^(hidden|veryHidden)$/.test(attribute(tag, "state") ?? ""),
      part: part !== null && parts.has(part) ? part : null,
    };
  });
}

export function sheetMarks(xml: string): SheetMarks {
  const hiddenColumns: number[] = [];
  const [head = ""] = xml.split(/<(?:\w+:)?sheetData\b/, 1);
  for (const tag of elements(head, "col")) {
    if (!isTrue(attribute(tag, "hidden"))) continue;
    const last = Math.min(Number(attribute(tag, "max")), LAST_COLUMN);
    for (let column = Number(attribute(tag, "min")); column <= last; column++) hiddenColumns.push(column - 1);
  }
  const hiddenRows = elements(xml, "row")
    .filter((tag) => isTrue(attribute(tag, "hidden")))
    .map((tag) => Number(attribute(tag, "r")));

  const formulaColumns = new Set<number>();
  const withoutValue: string[] = [];
  const cell =
    /<(?:\w+:)?c\s([^>]*[^/>])>\s*<(?:\w+:)?f\b[^>]*(?:\/>|>[^<]*<\/(?:\w+:)?f>)\s*(<(?:\w+:)?v>[^<]*)?/g;
  for (const [, attributes = "", value] of xml.matchAll(cell)) {
    const address = attribute(attributes, "r") ?? "";
    formulaColumns.add(columnOfAddress(address));
    // A text that a formula makes may be empty; a number may not.
    const isText = attribute(attributes, "t") === "str";
    if (value === undefined || (!isText && value.endsWith(">"))) withoutValue.push(address);
  }
  return {
    hiddenColumns,
    hiddenRows,
    formulaColumns: [...formulaColumns].filter((column) => column >= 0).sort((a, b) => a - b),
    withoutValue,
  };
}

/** "AB12" is column 27; −1 where the address names none. */
function columnOfAddress(address: string): number {
  let column = 0;
  for (const letter of address.match(/^[A-Z]+/)?.[0] ?? "") column = column * 26 + letter.charCodeAt(0) - 64;
  return column - 1;
}

/** 27 is "AB". */
export function columnLetters(column: number): string {
  let letters = "";
  for (let rest = column + 1; rest > 0; rest = Math.floor((rest - 1) / 26)) {
    letters = String.fromCharCode(65 + ((rest - 1) % 26)) + letters;
  }
  return letters;
}

export function textOf(parts: ReadonlyMap<string, Uint8Array>, path: string): string {
  const part = parts.get(path);
  return part === undefined ? "" : new TextDecoder().decode(part);
}

function elements(xml: string, name: string): string[] {
  return xml.match(new RegExp(`<(?:\\w+:)?${name}\\s[^>]*>`, "g")) ?? [];
}

function attribute(tag: string, name: string): string | null {
  const value = tag.match(new RegExp(`(?:^|\\s)${name}\\s*=\\s*(?:"([^"]*)"|'([^']*)')`));
  return value === null ? null : unescaped(value[1] ?? value[2] ?? "");
}

function unescaped(text: string): string {
  return text
    .replace(/&lt;/g, "<")
    .replace(/&gt;/g, ">")
    .replace(/&quot;/g, '"')
    .replace(/&apos;/g, "'")
    .replace(/&amp;/g, "&");
}

function isTrue(value: string | null): boolean {
  return value === "1" || value === "true";
}
