import { type AnySection, anySection } from "../section";
import { globalFit } from "./global-fit";
import { initialRates } from "./initial-rates";
import { orders } from "./orders";
import { readings } from "./readings";
import { studyRule } from "./study-rule";
import { traceOrder } from "./trace-order";

/** In the order in which they are printed. */
export const SECTIONS: readonly AnySection[] = [
  anySection(initialRates),
  anySection(studyRule),
  anySection(orders),
  anySection(globalFit),
  anySection(readings),
  anySection(traceOrder),
];

export function sectionNamed(name: string): AnySection | null {
  return SECTIONS.find((section) => section.name === name) ?? null;
}
