import { CheckNote } from "@/app/_ui/check";
import { Margin, MarginSection } from "@/app/_ui/margin";
import type { Check } from "@/app/_worksheet/analysis";
import { GridKeys } from "./grid-keys";

/** Checks on the runs, the common recipe, and the keys of the grid while it is open. */
export function RunMargin({
  checks,
  recipe,
  measured,
  showsKeys,
}: {
  checks: readonly Check[];
  /** Some run has a rate, so that there was something to check. */
  measured: boolean;
  recipe: readonly { readonly name: string; readonly value: string }[];
  showsKeys: boolean;
}) {
  return (
    <Margin label="Checks">
      <MarginSection title="Checks on the runs">
        {checks.length === 0 && !measured && (
          <p className="text-ink-2">None yet: they come with the first rates.</p>
        )}
        {checks.length === 0 && measured && (
          <CheckNote severity="holds" message="Nothing speaks against these runs." />
        )}
        {checks.map((check) => (
          <CheckNote
            key={`${check.code} ${check.runId} ${check.message}`}
            severity={check.severity}
            message={check.message}
            settled={check.settled}
            actions={
              check.runId !== null && check.settled === null ? (
                <a href={`#run-${check.runId}`}>Go to the run</a>
              ) : undefined
            }
          />
        ))}
      </MarginSection>
      {recipe.length > 0 && (
        <MarginSection title="Recipe">
          <dl className="fact-list">
            {recipe.map(({ name, value }) => (
              <div key={name} className="contents">
                <dt>{name}</dt>
                <dd>{value}</dd>
              </div>
            ))}
          </dl>
        </MarginSection>
      )}
      {showsKeys && <GridKeys />}
    </Margin>
  );
}
