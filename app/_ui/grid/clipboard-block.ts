/** A rectangular block on the clipboard, the way spreadsheets write it: tabs between cells, quotes round awkward ones. */
export type Block = readonly (readonly string[])[];

/**
 * Reads tab-separated text. Cells in quotes may hold tabs, line ends and doubled quotes. Text without any tab but
 * with a semicolon in every line is split at those. Rows that are empty at the end are dropped.
 */
export function parseBlock(text: string): string[][] {
  const clean = text.replace(/\r\n?/g, "\n").replace(/^\uFEFF/, "");
  const lines = clean.split("\n").filter((line) => line.trim() !== "");
  const separator =
    !clean.includes("\t") && lines.length > 0 && lines.every((line) => line.includes(";")) ? ";" : "\t";
  const rows: string[][] = [[]];
  let cell = "";
  let quoted = false;
  for (let at = 0; at < clean.length; at += 1) {
    const character = clean.charAt(at);
    if (quoted) {
      if (character !== '"') cell += character;
      else if (clean.charAt(at + 1) === '"') {
        cell += '"';
        at += 1;
      } else quoted = false;
    } else if (character === '"' && cell === "") quoted = true;
    else if (character === separator) {
      rows.at(-1)?.push(cell.trim());
      cell = "";
    } else if (character === "\n") {
      rows.at(-1)?.push(cell.trim());
      cell = "";
      rows.push([]);
    } else cell += character;
  }
  rows.at(-1)?.push(cell.trim());
  while (rows.length > 0 && rows.at(-1)?.every((text) => text === "")) rows.pop();
  return rows;
}

export function printBlock(block: Block): string {
  return block.map((row) => row.map(quotedCell).join("\t")).join("\n");
}

function quotedCell(text: string): string {
  return /["\t\n]/.test(text) ? `"${text.replaceAll('"', '""')}"` : text;
}
