import type { ConstantView, LawView } from "./law-view";
import { typeset } from "./prose";
import { Value } from "./value";

/** "rate = k [A]¹ [B]¹", set in the serif and never broken. */
export function LawExpression({ law }: { law: LawView }) {
  return (
    <span className="law whitespace-nowrap">
      rate = {typeset(law.constant)}
      {law.factors.map((factor) => (
        <span key={factor.symbol}>
          {"\u2009"}[{factor.symbol}]{factor.order !== "" && <sup>{typeset(factor.order)}</sup>}
        </span>
      ))}
    </span>
  );
}

/**
 * "k = 11.8 ± 0.3 L mol⁻¹ s⁻¹" in the serif; `marked` draws the highlighter under it, for what currently stands, and
 * `wiping` draws it from left to right, for what has just changed.
 */
export function Constant({
  constant,
  marked = false,
  wiping = false,
}: {
  constant: ConstantView;
  marked?: boolean;
  wiping?: boolean;
}) {
  return (
    <span className={`law whitespace-nowrap ${marked ? "marked" : ""} ${wiping ? "wiping" : ""}`.trim()}>
      {typeset(constant.symbol)} = <Value number={constant.number} unit={constant.unit} />
    </span>
  );
}

/** The law as one line of plain text, for titles and for what is spoken. */
export function spokenLaw(law: LawView): string {
  const factors = law.factors.map((factor) => `[${factor.symbol}]${factor.order}`).join(" ");
  return `rate = ${law.constant.replaceAll("*", "")} ${factors}`.trim();
}
