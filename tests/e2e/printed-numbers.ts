/** Numbers as the pages print them (true minus, narrow spaces between groups), in the order in which they stand. */
export function numbersIn(text: string): number[] {
  const plain = text.replaceAll("\u2212", "-").replaceAll(/(?<=\d)\u202f(?=\d{3})/g, "");
  return [...plain.matchAll(/-?\d+(?:\.\d+)?/g)].map(([number]) => Number(number));
}

const MOLAR: Readonly<Record<string, number>> = { mol: 1, mmol: 1e-3, µmol: 1e-6 };

/** What turns a column's numbers into mol/L(/s): its head names unit and power of ten, "10⁻³ mmol L⁻¹ s⁻¹". */
export function molarFactorInHead(head: string): number {
  const [, power = "0", unit = ""] = /(?:10([\u2212-]?\d+)\s)?([mµ]?mol)\sL/.exec(head) ?? [];
  const molar = MOLAR[unit];
  if (molar === undefined) throw new Error(`“${head}” names no unit of concentration.`);
  return molar * 10 ** Number(power.replace("\u2212", "-"));
}
