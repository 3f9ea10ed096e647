import { Fragment, type ReactNode } from "react";
import { NARROW_SPACE } from "./narrow-space";

/**
 * Power: ^-1, ^0.5, ^{n}. Index: _0, _{obs}, only after a slanted letter or a bracket, so that names of runs and files
 * keep their underscores. Slant: *k*. Reversible arrow: ⇌, which neither family has.
 */
const MARKUP =
  /\^\{([^}]*)\}|\^([-−+]?\d+(?:\.\d+)?)|(?<=[*\])])_\{([^}]*)\}|(?<=[*\])])_([A-Za-z0-9]+)|\*([^*\s][^*]*)\*|(⇌|<=>)/g;

/**
 * Sets a plain string of a view: "*k*_0 = 11.8 L mol^-1 s^-1". Superscripts are real <sup> elements, since the text
 * families have no raised minus; a hyphen in an exponent becomes a true minus.
 */
export function Prose({ text }: { text: string }) {
  return <>{typeset(text)}</>;
}

const UNIT = "[µmnk]?(?:mol|L|s|min|h|K|m|g)";
const BETWEEN_FACTORS = new RegExp(`(?<=[A-Za-z]|\\^[-−]?[\\d.]+) (?=${UNIT}\\^)`, "g");
const BEFORE_UNIT = new RegExp(`(?<=\\d) (?=%|°C|${UNIT}(?![A-Za-z]))`, "g");

/** A value never parts from its unit, its sign or its uncertainty at the end of a line. */
function keepTogether(text: string): string {
  return text
    .replaceAll(BETWEEN_FACTORS, NARROW_SPACE)
    .replaceAll(BEFORE_UNIT, "\u00a0")
    .replaceAll(/ ([=±×<>≤≥≈]) (?=\S)/g, "\u00a0$1\u00a0");
}

export function typeset(written: string): ReactNode[] {
  const text = keepTogether(written);
  const nodes: ReactNode[] = [];
  let from = 0;
  for (const match of text.matchAll(MARKUP)) {
    if (match.index > from) nodes.push(text.slice(from, match.index));
    nodes.push(<Fragment key={match.index}>{setOne(match)}</Fragment>);
    from = match.index + match[0].length;
  }
  if (from < text.length) nodes.push(text.slice(from));
  return nodes;
}

function setOne(match: RegExpMatchArray): ReactNode {
  const [, bracedPower, power, bracedIndex, index, slanted] = match;
  const raised = bracedPower ?? power;
  const lowered = bracedIndex ?? index;
  if (raised !== undefined) return <sup>{typeset(raised.replace("-", "−"))}</sup>;
  if (lowered !== undefined) return <sub>{typeset(lowered)}</sub>;
  if (slanted !== undefined) return <i>{typeset(slanted)}</i>;
  return <ReversibleArrow />;
}

/** ⇌, drawn: neither text family has the glyph. */
export function ReversibleArrow() {
  return (
    <svg
      viewBox="0 0 28 12"
      role="img"
      aria-label="in equilibrium with"
      style={{ width: "1.5em", height: ".65em" }}
      className="inline-block"
    >
      <path d="M1 4h25.5l-5-3.4M27 8H1.5l5 3.4" fill="none" stroke="currentColor" strokeWidth="1.2" />
    </svg>
  );
}
