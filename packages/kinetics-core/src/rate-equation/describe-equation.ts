import type { RateEquation } from "./rate-equation";

const FORMS: ReadonlyMap<string, string> = new Map([
  ["power", "Powers of concentrations"],
  ["background", "A second path in the background"],
  ["reversible", "Reversible"],
  ["saturating", "Saturating"],
  ["inhibited", "Inhibited"],
  ["autocatalytic", "Autocatalytic"],
  ["catalyst", "Order in a catalyst"],
  ["expression", "Your own expression"],
]);

/** The form and the law in one line of plain text: "Reversible: v = k ([A] − [P]/K)". */
export function describeEquation({ form, law }: Pick<RateEquation, "form" | "law">): string {
  return `${FORMS.get(form) ?? form}: ${law}`;
}
