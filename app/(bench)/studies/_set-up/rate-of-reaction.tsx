import { typeset } from "@/app/_ui/prose";
import type { RateDefinition, RateTerm } from "./rate-definition";

/** rate = −d[A]/dt = −(1/2) d[B]/dt = … = (1/ε l) dA/dt, set as fractions, with its words beside it. */
export function RateOfReaction({ definition }: { definition: RateDefinition }) {
  return (
    <div className="grid grid-cols-[minmax(0,auto)_minmax(0,1fr)] items-center gap-x-10 gap-y-3 narrow:grid-cols-1">
      <div className="law flex flex-wrap items-center gap-x-3.5 gap-y-1 text-[25px] leading-[1.3] phone:text-[22px]">
        {definition.terms.length === 0 && <span>rate</span>}
        {definition.terms.map((term, index) => (
          <span key={keyOf(term)} className="whitespace-nowrap">
            {index === 0 && "rate "}= {term.sign}
            <Factor term={term} />
            <Fraction top={changeOf(term)} bottom={<Differential of={<i>t</i>} />} />
          </span>
        ))}
      </div>
      <p className="max-w-[60ch] text-[14px] leading-[1.4] text-ink-2">{typeset(definition.words)}</p>
    </div>
  );
}

function keyOf({ change }: RateTerm): string {
  return change.kind === "species" ? `[${change.symbol}]` : "signal";
}

function Factor({ term }: { term: RateTerm }) {
  const { divisor, change } = term;
  if (change.kind === "signal") {
    return (
      <Fraction
        top="1"
        bottom={
          <>
            {divisor !== "" && `${divisor}\u2009`}
            {typeset(change.factor)}
          </>
        }
      />
    );
  }
  return divisor === "" ? null : <Fraction top="1" bottom={divisor} />;
}

function changeOf({ change }: RateTerm) {
  return <Differential of={change.kind === "species" ? `[${change.symbol}]` : typeset(change.quantity)} />;
}

function Differential({ of }: { of: React.ReactNode }) {
  return (
    <>
      <span className="not-italic">d</span>
      {of}
    </>
  );
}

function Fraction({ top, bottom }: { top: React.ReactNode; bottom: React.ReactNode }) {
  return (
    <span className="relative top-[-0.04em] mx-[0.12em] inline-flex flex-col text-center align-middle leading-[1.16]">
      <span className="border-b-[1.4px] border-current px-[0.18em] pb-[0.06em]">{top}</span>
      <span className="px-[0.18em] pt-[0.08em]">{bottom}</span>
    </span>
  );
}
