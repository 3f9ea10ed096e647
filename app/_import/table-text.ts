import type { TableTextReading } from "./container";
import type { Corrections } from "./corrections";
import { decodeText } from "./decode";
import { isJcamp } from "./jcamp/labelled-records";
import { readJcamp } from "./jcamp/read-jcamp";
import { isWorkbook, readWorkbook } from "./workbook/read-workbook";

/** The text of the table inside a file, by what the file is. */
export async function tableText(bytes: Uint8Array, corrections: Corrections): Promise<TableTextReading> {
  return isWorkbook(bytes) ? readWorkbook(bytes, corrections.sheet) : textTable(bytes, corrections);
}

/** Of anything but a workbook. */
export function textTable(bytes: Uint8Array, corrections: Corrections): TableTextReading {
  const decoded = decodeText(bytes, corrections.encoding);
  if (decoded.status === "refused") return decoded;
  if (isJcamp(decoded.text)) return readJcamp(decoded.text, decoded.encoding);
  return { ...decoded, container: "text", format: null, sheet: null, issues: [] };
}
