/** Numbers as the pages print them (true minus, narrow spaces between groups), in the order in which they stand. */
export function numbersIn(text: string): number[] {
  const plain = text.replaceAll("\u2212", "-").replaceAll(/(?<=\d)\u202f(?=\d{3})/g, "");
  return [...plain.matchAll(/-?\d+(?:\.\d+)?/g)].map(([number]) => Number(number));
}

/** The power of ten that a column's head gives with its unit, "10⁻⁷ mol L⁻¹ s⁻¹" as set text; one where it gives none. */
export function factorInHead(head: string): number {
  const power = /10([\u2212-]?\d+)/.exec(head)?.[1];
  return power === undefined ? 1 : 10 ** Number(power.replace("\u2212", "-"));
}
