import { type AnySection, anySection } from "../section";
import { initialRates } from "./initial-rates";
import { orders } from "./orders";
import { studyRule } from "./study-rule";

/** In the order in which they are printed. */
export const SECTIONS: readonly AnySection[] = [
  anySection(initialRates),
  anySection(studyRule),
  anySection(orders),
];

export function sectionNamed(name: string): AnySection | null {
  return SECTIONS.find((section) => section.name === name) ?? null;
}
