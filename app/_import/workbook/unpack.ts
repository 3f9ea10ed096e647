import { Unzip, UnzipInflate, zipSync } from "fflate";

/**
 * The parts of a workbook, inflated no further than a bench's table can need. What an archive declares of its sizes is
 * not believed: inflating stops at the limit itself, whatever the archive says.
 */

/** Some two million cells. */
const MOST_INFLATED_BYTES = 128 * 1024 * 1024;
const MOST_PARTS = 2000;
const FED_AT_ONCE = 64 * 1024;

export type Unpacked =
  | { readonly status: "unpacked"; readonly parts: ReadonlyMap<string, Uint8Array> }
  | { readonly status: "too-large" | "damaged" };

/** XML parts only, by their path in the archive; pictures and printer settings are passed over. */
export function unpackWorkbook(bytes: Uint8Array, mostBytes = MOST_INFLATED_BYTES): Unpacked {
  if (!hasDirectoryEnd(bytes)) return { status: "damaged" };
  const open = new Map<string, Uint8Array[]>();
  const parts = new Map<string, Uint8Array>();
  let inflated = 0;
  let fault: "too-large" | "damaged" | null = null;

  const unzip = new Unzip((file) => {
    if (!/\.(xml|rels)$/.test(file.name)) return;
    if (open.size >= MOST_PARTS) {
      fault ??= "too-large";
      return;
    }
    const chunks: Uint8Array[] = [];
    open.set(file.name, chunks);
    file.ondata = (error, chunk, final) => {
      if (error) fault ??= "damaged";
      if (fault !== null) return;
      inflated += chunk.length;
      if (inflated > mostBytes) {
        fault = "too-large";
        file.terminate();
        return;
      }
      chunks.push(chunk);
      if (final) parts.set(file.name, joined(chunks));
    };
    file.start();
  });
  unzip.register(UnzipInflate);
  try {
    for (let at = 0; at < bytes.length && fault === null; at += FED_AT_ONCE) {
      unzip.push(bytes.subarray(at, at + FED_AT_ONCE), at + FED_AT_ONCE >= bytes.length);
    }
  } catch {
    // The library throws on broken archives, from within whatever it was doing.
    fault ??= "damaged";
  }
  if (fault !== null) return { status: fault };
  return parts.size === open.size && parts.size > 0 ? { status: "unpacked", parts } : { status: "damaged" };
}

/** An archive ends with its directory; one that was cut off does not. */
function hasDirectoryEnd(bytes: Uint8Array): boolean {
  for (let i = bytes.length - 22; i >= Math.max(0, bytes.length - 66_000); i--) {
    if (bytes[i] === 0x50 && bytes[i + 1] === 0x4b && bytes[i + 2] === 5 && bytes[i + 3] === 6) return true;
  }
  return false;
}

/** The same parts, stored without compression, for a reader that wants an archive. */
export function repacked(parts: ReadonlyMap<string, Uint8Array>): ArrayBuffer {
  const packed = zipSync(Object.fromEntries(parts), { level: 0 });
  return packed.buffer.byteLength === packed.byteLength ? packed.buffer : packed.slice().buffer;
}

function joined(chunks: readonly Uint8Array[]): Uint8Array {
  const whole = new Uint8Array(chunks.reduce((sum, chunk) => sum + chunk.length, 0));
  let at = 0;
  for (const chunk of chunks) {
    whole.set(chunk, at);
    at += chunk.length;
  }
  return whole;
}
