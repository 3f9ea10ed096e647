/** A table in Markdown; numbers are already text. */
export function markdownTable(head: readonly string[], rows: readonly (readonly string[])[]): string {
  const widths = head.map((title, i) => Math.max(title.length, ...rows.map((row) => (row[i] ?? "").length)));
  const line = (cells: readonly string[]) =>
    `| ${cells.map((text, i) => text.padEnd(widths[i] ?? 0)).join(" | ")} |`;
  return [line(head), line(widths.map((width) => "-".repeat(width))), ...rows.map(line)].join("\n");
}

export function percent(part: number, digits = 1): string {
  return Number.isFinite(part) ? (100 * part).toFixed(digits) : "–";
}

export function significant(value: number, digits = 3): string {
  return Number.isFinite(value) ? String(Number(value.toPrecision(digits))) : "–";
}
