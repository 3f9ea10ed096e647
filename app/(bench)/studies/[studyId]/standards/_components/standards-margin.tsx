import { CheckNote } from "@/app/_ui/check";
import { Margin, MarginSection } from "@/app/_ui/margin";
import { typeset } from "@/app/_ui/prose";
import { Unit } from "@/app/_ui/unit";
import type { StandardsView } from "../view";

/** Limits, what speaks against the line, and where the slope's uncertainty comes from. */
export function StandardsMargin({ view }: { view: StandardsView }) {
  return (
    <Margin label="Limits and checks of the line">
      {view.limits.length > 0 && (
        <MarginSection title="Limits">
          <dl className="fact-list">
            {view.limits.map(({ name, text }) => (
              <div key={name} className="contents">
                <dt>{name}</dt>
                <dd>{typeset(text)}</dd>
              </div>
            ))}
          </dl>
          <p className="mt-2 text-caption text-ink-2">
            Detection and quantitation are 3.3 and 10 times the scatter over the slope.
          </p>
        </MarginSection>
      )}
      {view.limits.length > 0 && (
        <MarginSection title="Checks on the standards">
          {view.flags.length === 0 ? (
            <CheckNote severity="holds" message="Nothing speaks against this line." />
          ) : (
            <>
              <p className="mb-2 text-caption text-ink-2">
                Concentrations in <Unit text={view.unitText} />.
              </p>
              {view.flags.map(({ code, severity, message }) => (
                <CheckNote key={code} severity={severity} message={message} />
              ))}
            </>
          )}
        </MarginSection>
      )}
      {view.budget.length > 0 && (
        <MarginSection title="Where ± comes from">
          <dl className="fact-list">
            {view.budget.map(({ source, text }) => (
              <div key={source} className="contents">
                <dt>{source}</dt>
                <dd>{text}</dd>
              </div>
            ))}
          </dl>
          <p className="mt-2 text-caption text-ink-2">
            Standard uncertainties of the slope, combined in squares, <Unit text={view.slopeUnit} />. Errors
            of single standards show as scatter about the line.
          </p>
        </MarginSection>
      )}
    </Margin>
  );
}
