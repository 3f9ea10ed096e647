import { followedSpecies } from "@/app/_worksheet/present-runs";
import type { Sheet, SheetSpecies } from "@/db/sheet/sheet.schema";

/**
 * What k is defined for, in one line: "2 ester (A) + initiator (B) → product (P); ester is followed, ν = −2."
 * A constant without the reaction and the stoichiometric number cannot be checked by anybody. "" where the set-up
 * does not say what reacts.
 */
export function reactionInWords(sheet: Sheet): string {
  const side = (sign: 1 | -1) =>
    sheet.species
      .filter(({ stoichiometricNumber }) => stoichiometricNumber * sign > 0)
      .map(term)
      .join(" + ");
  const [left, right] = [side(-1), side(1)];
  if (left === "" || right === "") return "";
  const followed = followedSpecies(sheet);
  const follows =
    followed === null || sheet.signal === null
      ? ""
      : `; ${followed.name} is followed, ν = ${signed(followed.stoichiometricNumber)}`;
  return `${left} → ${right}${follows}.`;
}

function term({ name, symbol, stoichiometricNumber }: SheetSpecies): string {
  const size = Math.abs(stoichiometricNumber);
  const count = size === 1 ? "" : `${size} `;
  return `${count}${name}${symbol === "" || symbol === name ? "" : ` (${symbol})`}`;
}

function signed(number: number): string {
  return `${number < 0 ? "−" : "+"}${Math.abs(number)}`;
}
