/**
 * Text for plotly, which reads a little HTML, links among it, and %{…} as a place to fill in. Names come from people
 * and files: they are shown as they were written and are never markup.
 */
export function literal(text: string): string {
  return text
    .replaceAll("&", "&amp;")
    .replaceAll("<", "&lt;")
    .replaceAll(">", "&gt;")
    .replaceAll("%{", "%&#123;");
}

/** Prose as the library's own little HTML. */
export function markedUp(prose: string): string {
  return literal(prose)
    .replaceAll(/\*([^*\s][^*]*)\*/g, "<i>$1</i>")
    .replaceAll(/(?<=[>\])])_\{?([A-Za-z0-9]+)\}?/g, "<sub>$1</sub>")
    .replaceAll(/\^\{?([-−]?[\w.]+)\}?/g, (_, power: string) => `<sup>${power.replace("-", "−")}</sup>`);
}
