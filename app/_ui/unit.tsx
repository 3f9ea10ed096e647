import { typeset } from "./prose";

/** A quarter of an em: a thin space lets "µmol L" run together at the size of a column head. */
const UNIT_SPACE = "\u2005";

/** A unit from plain text, "L mol^-1 s^-1": negative exponents raised, narrow spaces between, never broken. */
export function Unit({ text }: { text: string }) {
  return <span className="whitespace-nowrap">{typeset(text.trim().replaceAll(/\s+/g, UNIT_SPACE))}</span>;
}
