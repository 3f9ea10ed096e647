import { NARROW_SPACE } from "./narrow-space";
import { typeset } from "./prose";

/** A unit from plain text, "L mol^-1 s^-1": negative exponents raised, narrow spaces between, never broken. */
export function Unit({ text }: { text: string }) {
  return <span className="whitespace-nowrap">{typeset(text.trim().replaceAll(/\s+/g, NARROW_SPACE))}</span>;
}
