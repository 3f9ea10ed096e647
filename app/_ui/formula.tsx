import { Fragment, type ReactNode } from "react";
import { ReversibleArrow } from "./prose";

/**
 * A chemical formula from plain text: "CH3CO2-" gives CH₃CO₂⁻, "Fe^3+" and "SO4^2-" their charges, "(NH4)2" its
 * index. Digits after a letter or bracket sink; a leading number is a coefficient and stays.
 */
export function Formula({ text }: { text: string }) {
  return <span className="whitespace-nowrap">{setFormula(text)}</span>;
}

const PARTS = /\^(\d*[+\-−])|(?<=[A-Za-z)\]])(\d+)|([+\-−])(?=$|\s)/g;

function setFormula(text: string): ReactNode[] {
  const nodes: ReactNode[] = [];
  let from = 0;
  for (const match of text.matchAll(PARTS)) {
    if (match.index > from) nodes.push(text.slice(from, match.index));
    const [whole, power, index, sign] = match;
    const raised = power ?? sign;
    nodes.push(
      raised === undefined ? (
        <sub key={match.index}>{index}</sub>
      ) : (
        <sup key={match.index}>{raised.replace("-", "−")}</sup>
      ),
    );
    from = match.index + whole.length;
  }
  if (from < text.length) nodes.push(text.slice(from));
  return nodes;
}

export interface ReactionTerm {
  /** Absolute stoichiometric number; 1 is not printed. */
  readonly coefficient: number;
  readonly formula: string;
  /** Under the formula: symbol, name, "P, followed". */
  readonly note: string;
}

/** A reaction set in the serif with a note under every term. `spoken` is what a screen reader says instead. */
export function Reaction({
  left,
  right,
  arrow,
  spoken,
}: {
  left: readonly ReactionTerm[];
  right: readonly ReactionTerm[];
  arrow: "forward" | "reversible";
  spoken: string;
}) {
  return (
    <div
      className="law flex flex-wrap items-start gap-x-3.5 gap-y-1.5 text-title phone:text-[23px]"
      role="img"
      aria-label={spoken}
    >
      <Side terms={left} />
      <span className="text-ink-2">{arrow === "forward" ? <ForwardArrow /> : <ReversibleArrow />}</span>
      <Side terms={right} />
    </div>
  );
}

function Side({ terms }: { terms: readonly ReactionTerm[] }) {
  return terms.map((term, position) => (
    <Fragment key={`${term.formula} ${position}`}>
      {position > 0 && <span className="text-ink-2">+</span>}
      <span className="inline-flex flex-col">
        <span className="whitespace-nowrap">
          {term.coefficient !== 1 && `${term.coefficient}\u2009`}
          <Formula text={term.formula} />
        </span>
        <small className="font-sans text-label text-ink-2">{term.note}</small>
      </span>
    </Fragment>
  ));
}

/** A long forward arrow; drawn, so that it matches the reversible one. */
function ForwardArrow() {
  return (
    <svg
      aria-hidden="true"
      viewBox="0 0 40 12"
      style={{ width: "1.5em", height: ".45em" }}
      className="inline-block align-middle"
    >
      <path d="M1 6h37m-6-4.5 6.5 4.5-6.5 4.5" fill="none" stroke="currentColor" strokeWidth="1.5" />
    </svg>
  );
}
