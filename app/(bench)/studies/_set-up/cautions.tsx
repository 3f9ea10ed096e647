import { SeverityMark } from "@/app/_ui/check";
import type { SetUpForm } from "./set-up-form.schema";
import { cautionsOf } from "./usual-cautions";

/** Cautions of a study: what the reaction gives away and what people wrote. Never instead of sheet, rules and supervision. */
export function Cautions({
  form,
  children,
}: {
  form: Pick<SetUpForm, "species" | "hazards">;
  /** Under the cautions: the way to edit them. */
  children?: React.ReactNode;
}) {
  const cautions = cautionsOf(form);
  return (
    <div className="mb-5 break-inside-avoid rounded-[3px] border border-warn border-l-[3px] px-3.5 py-3">
      <h2>
        <SeverityMark severity="weakens">Cautions for this study</SeverityMark>
      </h2>
      {cautions.length > 0 && (
        <ul className="mt-1">
          {cautions.map(({ concerns, text }) => (
            <li key={`${concerns} ${text}`} className="border-t border-rule-2 py-1.5">
              {concerns !== "" && <b className="font-semibold">{concerns}</b>}
              <span className="block text-caption text-ink-2">{text}</span>
            </li>
          ))}
        </ul>
      )}
      <p className="mt-2">
        Read the safety data sheet of each reagent, follow your local rules, and work under competent
        supervision.
      </p>
      {children}
    </div>
  );
}
