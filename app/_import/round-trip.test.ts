import { describe, expect, it } from "vitest";
import { readTable } from "./read-file";
import type { Separator } from "./rows";
import { textTable } from "./table-text";
import { EMPTY_STUDY } from "./testing-context";

/**
 * Random tables written in every separator, decimal mark, encoding and line end must come back to the last bit. The
 * generator is seeded, so that a failure names a table that can be made again.
 */

/** Mulberry32: 32-bit state, enough for test tables. */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let mixed = Math.imul(state ^ (state >>> 15), 1 | state);
    mixed = (mixed + Math.imul(mixed ^ (mixed >>> 7), 61 | mixed)) ^ mixed;
    return ((mixed ^ (mixed >>> 14)) >>> 0) / 2 ** 32;
  };
}

function encode(text: string, encoding: string): Uint8Array {
  if (encoding === "utf-8") return new TextEncoder().encode(text);
  if (encoding === "utf-8 with mark") return new TextEncoder().encode(`\ufeff${text}`);
  if (encoding === "windows-1252") return Uint8Array.from(text, (character) => character.charCodeAt(0));
  const bytes = Buffer.from(`\ufeff${text}`, "utf16le");
  return encoding === "utf-16be" ? bytes.swap16() : bytes;
}

const SEPARATORS: readonly Separator[] = [",", ";", "\t", "|"];
const ENCODINGS = ["utf-8", "utf-8 with mark", "utf-16le", "utf-16be", "windows-1252"];

describe("a table that goes out and comes in", () => {
  const cases = SEPARATORS.flatMap((separator) =>
    [".", ","].flatMap((mark) => ENCODINGS.map((encoding) => ({ separator, mark, encoding }))),
  );

  it.each(cases)("separator $separator, decimal $mark, $encoding", ({ separator, mark, encoding }) => {
    for (let table = 0; table < 12; table++) {
      const random = seeded(table * 7919 + separator.charCodeAt(0) * 31 + mark.charCodeAt(0));
      const runs = 1 + Math.floor(random() * 6);
      const rows = 5 + Math.floor(random() * 60);
      const times = Array.from({ length: rows }, (_, i) => i * 0.37 + random() * 0.3 + 0.011);
      const signals = Array.from({ length: runs }, () =>
        times.map(() => (random() - 0.3) * 10 ** Math.floor(random() * 9 - 6)),
      );
      const cell = (value: number) => {
        const text = (random() < 0.2 ? value.toExponential() : String(value))
          .replace(".", mark)
          .replace(/^-/, random() < 0.5 && encoding !== "windows-1252" ? "−" : "-");
        return mark === "," && separator === "," ? `"${text}"` : text;
      };
      const names = signals.map((_, run) => `"K${"ü"}vette ${String.fromCharCode(65 + run)}"`);
      const preamble = random() < 0.5 ? ["Absorbance, cell one", ""] : [];
      const lines = [
        ...preamble,
        [`t / s`, ...names].join(separator),
        ...times.map((time, i) =>
          [cell(time), ...signals.map((signal) => cell(signal[i] ?? 0))].join(separator),
        ),
        ...(random() < 0.5 ? ["", separator.repeat(runs)] : []),
      ];
      const text = lines.join(random() < 0.5 ? "\r\n" : "\n");

      const reading = readTable(textTable(encode(text, encoding), {}), EMPTY_STUDY, {});
      if (reading.status !== "read") throw new Error(`table ${table}: ${reading.message}`);
      expect(
        reading.issues.filter((issue) => issue.severity === "blocks"),
        `table ${table}`,
      ).toEqual([]);
      expect(reading.traces.map((trace) => trace.label)).toEqual(names.map((name) => name.slice(1, -1)));
      for (const [run, trace] of reading.traces.entries()) {
        expect([...trace.timeSeconds], `table ${table}`).toEqual(times);
        expect([...trace.signal], `table ${table}`).toEqual(signals[run]);
      }
    }
  });
});
