import { strToU8, zipSync } from "fflate";

/** A workbook made part by part, for what no spreadsheet program would let a test write. */
export interface TestSheet {
  readonly name: string;
  readonly state?: "visible" | "hidden";
  /** What stands before the rows: `<cols>…</cols>`. */
  readonly head?: string;
  /** The rows, as XML. */
  readonly rows: string;
}

export function testWorkbook(
  sheets: readonly TestSheet[],
  sharedStrings: readonly string[] = [],
): Uint8Array {
  const list = sheets
    .map(
      ({ name, state = "visible" }, i) =>
        `<sheet name="${name}" sheetId="${i + 1}" state="${state}" r:id="rId${i + 1}"/>`,
    )
    .join("");
  const relations = sheets
    .map(
      (_, i) =>
        `<Relationship Id="rId${i + 1}" Type="${OFFICE}/worksheet" Target="worksheets/sheet${i + 1}.xml"/>`,
    )
    .join("");
  const strings = sharedStrings.map((text) => `<si><t>${text}</t></si>`).join("");
  return zipSync({
    "[Content_Types].xml": strToU8("<Types/>"),
    "xl/workbook.xml": strToU8(
      `<workbook xmlns="${MAIN}" xmlns:r="${OFFICE}"><sheets>${list}</sheets></workbook>`,
    ),
    "xl/_rels/workbook.xml.rels": strToU8(
      `<Relationships>${relations}<Relationship Id="rIdS" Type="${OFFICE}/sharedStrings" Target="sharedStrings.xml"/><Relationship Id="rIdF" Type="${OFFICE}/styles" Target="styles.xml"/></Relationships>`,
    ),
    "xl/sharedStrings.xml": strToU8(`<sst xmlns="${MAIN}">${strings}</sst>`),
    // Style 1 is a time of day (number format 21), style 2 a date with time (22).
    "xl/styles.xml": strToU8(
      `<styleSheet xmlns="${MAIN}"><cellXfs><xf numFmtId="0"/><xf numFmtId="21"/><xf numFmtId="22"/></cellXfs></styleSheet>`,
    ),
    ...Object.fromEntries(
      sheets.map(({ head = "", rows }, i) => [
        `xl/worksheets/sheet${i + 1}.xml`,
        strToU8(`<worksheet xmlns="${MAIN}">${head}<sheetData>${rows}</sheetData></worksheet>`),
      ]),
    ),
  });
}

const MAIN = "http://schemas.openxmlformats.org/spreadsheetml/2006/main";
const OFFICE = "http://schemas.openxmlformats.org/officeDocument/2006/relationships";

/** Rows of numbers and texts from A1 on; null leaves a cell out. A text that begins with "<" is a cell's own XML. */
export function testRows(rows: readonly (readonly (number | string | null)[])[]): string {
  return rows
    .map((cells, i) => {
      const row = cells.map((cell, j) => cellXml(cell, `${String.fromCharCode(65 + j)}${i + 1}`)).join("");
      return `<row r="${i + 1}">${row}</row>`;
    })
    .join("");
}

function cellXml(cell: number | string | null, address: string): string {
  if (cell === null) return "";
  if (typeof cell === "number") return `<c r="${address}"><v>${cell}</v></c>`;
  if (cell.startsWith("<")) return cell;
  return `<c r="${address}" t="inlineStr"><is><t>${cell}</t></is></c>`;
}
