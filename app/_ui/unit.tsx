import { typeset } from "./prose";

const THIN_SPACE = "\u2009";

/** A unit from plain text, "L mol^-1 s^-1": negative exponents raised, thin spaces between, never broken. */
export function Unit({ text }: { text: string }) {
  return <span className="whitespace-nowrap">{typeset(text.trim().replaceAll(/\s+/g, THIN_SPACE))}</span>;
}
