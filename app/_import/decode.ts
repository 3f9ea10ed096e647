import type { Guess } from "./reading";

/**
 * Bytes as they came to text. Tables leave instruments and spreadsheets as UTF-8, UTF-16 or Windows-1252; anything
 * else is refused by name, with the way to a file that can be read.
 */

export type Encoding = "utf-8" | "utf-16le" | "utf-16be" | "windows-1252";

export const ENCODING_NAMES: Record<Encoding, string> = {
  "utf-8": "UTF-8",
  "utf-16le": "UTF-16, little-endian",
  "utf-16be": "UTF-16, big-endian",
  "windows-1252": "Windows-1252 (Western European)",
};

export type DecodedText =
  | { readonly status: "text"; readonly text: string; readonly encoding: Guess<Encoding> }
  /** `message` says what the file is and what to do instead. */
  | { readonly status: "refused"; readonly message: string };

/** `stated` overrides the guess. Line ends come back as "\n"; a byte-order mark is dropped from the text. */
export function decodeText(bytes: Uint8Array, stated?: Encoding): DecodedText {
  if (bytes.length === 0) {
    return {
      status: "refused",
      message: "The file is empty: it holds 0 bytes. Export it again and choose the new file.",
    };
  }
  const binary = binaryKind(bytes);
  if (binary !== null) return { status: "refused", message: binary };

  const encoding: Guess<Encoding> | null = stated
    ? { value: stated, reason: "chosen by hand", basis: "stated" }
    : guessEncoding(bytes);
  if (encoding === null) return { status: "refused", message: NOT_TEXT };

  const text = new TextDecoder(encoding.value).decode(bytes).replace(/\r\n?/g, "\n");
  if (text.includes("\u0000")) return { status: "refused", message: NOT_TEXT };
  if (text.trim() === "") {
    return {
      status: "refused",
      message: "The file holds nothing but blank lines. Export it again and choose the new file.",
    };
  }
  return { status: "text", text, encoding };
}

const NOT_TEXT =
  "This is a binary file, not a table of text. Export the readings as CSV, or open the file in a spreadsheet and save it as XLSX or CSV.";

/** First bytes of what people drop by mistake, most often the workbook itself. */
function binaryKind(bytes: Uint8Array): string | null {
  const starts = (...magic: number[]) => magic.every((byte, i) => bytes[i] === byte);
  if (starts(0x50, 0x4b, 0x03, 0x04)) {
    return "This is a ZIP archive or a packed document. Take the table out of it; if it is a spreadsheet, save it as XLSX or CSV.";
  }
  if (starts(0xd0, 0xcf, 0x11, 0xe0)) {
    return "This is a workbook of the old format (XLS), or one locked by a password; neither is read here. Save it as XLSX without a password, or the sheet as CSV, and choose that file.";
  }
  if (starts(0x25, 0x50, 0x44, 0x46)) {
    return "This is a PDF. A table cannot be read from it reliably: export the readings from the instrument as CSV.";
  }
  if (starts(0x89, 0x50, 0x4e, 0x47) || starts(0xff, 0xd8, 0xff) || starts(0x47, 0x49, 0x46, 0x38)) {
    return "This is a picture. Export the readings from the instrument as CSV and choose that file.";
  }
  if (starts(0x1f, 0x8b)) return "This file is compressed (gzip). Unpack it and choose the table inside.";
  return null;
}

function guessEncoding(bytes: Uint8Array): Guess<Encoding> | null {
  if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) {
    return { value: "utf-8", reason: "the file begins with the UTF-8 mark", basis: "file" };
  }
  if (bytes[0] === 0xff && bytes[1] === 0xfe) {
    return { value: "utf-16le", reason: "the file begins with the UTF-16 mark", basis: "file" };
  }
  if (bytes[0] === 0xfe && bytes[1] === 0xff) {
    return { value: "utf-16be", reason: "the file begins with the UTF-16 mark", basis: "file" };
  }
  const head = bytes.subarray(0, 65_536);
  const zeros: [number, number] = [0, 0];
  let controls = 0;
  for (let i = 0; i < head.length; i++) {
    const byte = head[i] ?? 0;
    if (byte === 0) zeros[i % 2 === 0 ? 0 : 1] += 1;
    else if (byte < 32 && byte !== 9 && byte !== 10 && byte !== 13 && byte !== 12) controls += 1;
  }
  const half = head.length / 2;
  if (zeros[1] > 0.6 * half && zeros[0] < 0.05 * half) {
    return { value: "utf-16le", reason: "every second byte is zero, as in UTF-16", basis: "file" };
  }
  if (zeros[0] > 0.6 * half && zeros[1] < 0.05 * half) {
    return { value: "utf-16be", reason: "every second byte is zero, as in UTF-16", basis: "file" };
  }
  if (zeros[0] + zeros[1] > 0 || controls > 0.01 * head.length) return null;
  try {
    const text = new TextDecoder("utf-8", { fatal: true }).decode(bytes);
    return {
      value: "utf-8",
      // Every other character takes more bytes in UTF-8 than units of a string.
      reason:
        text.length === bytes.length
          ? "nothing but plain ASCII characters"
          : "every character is valid UTF-8",
      basis: "file",
    };
  } catch {
    return {
      value: "windows-1252",
      reason: "some characters are not valid UTF-8, as in files saved by older programs on Windows",
      basis: "assumed",
    };
  }
}
