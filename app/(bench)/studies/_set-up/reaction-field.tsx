"use client";

import { SeverityMark } from "@/app/_ui/check";
import { TextArea } from "@/app/_ui/field";
import { Reaction } from "@/app/_ui/formula";
import { parseReaction, type ReactionReading } from "@/app/_worksheet/reaction/parse-reaction";
import { speciesOfReaction } from "@/app/_worksheet/reaction/reaction-species";
import { reactionView } from "./reaction-view";
import { speciesAfterReaction } from "./set-up-form";
import type { SpeciesForm } from "./set-up-form.schema";

/** The reaction as typed, typeset as it was understood, with its balance. The species table follows what is typed. */
export function ReactionField({
  value,
  species,
  readOnly = false,
  onChange,
}: {
  value: string;
  species: readonly SpeciesForm[];
  readOnly?: boolean;
  onChange: (reaction: string, species: SpeciesForm[] | null) => void;
}) {
  const reading = parseReaction(value);
  const view = reading.status === "read" ? reactionView(reading.reaction, species) : null;
  return (
    <div className="border-t-2 border-b border-t-ink border-b-ink py-3.5">
      <TextArea
        label={
          <>
            Reaction <span className="unit-note">typed; symbols in brackets</span>
          </>
        }
        value={value}
        rows={1}
        className="resize-none [field-sizing:content]"
        spellCheck={false}
        readOnly={readOnly}
        placeholder="CH3CO2C6H4NO2 [A] + 2 OH- [B] -> CH3CO2- + NO2C6H4O- [P] + H2O"
        error={reading.status === "unreadable" ? <Fault typed={value} reading={reading} /> : undefined}
        onChange={(event) => {
          const text = event.target.value.replaceAll("\n", " ");
          const next = parseReaction(text);
          onChange(
            text,
            next.status === "read" ? speciesAfterReaction(species, speciesOfReaction(next.reaction)) : null,
          );
        }}
      />
      {view !== null && (
        <>
          <div className="mt-3.5">
            <Reaction left={view.left} right={view.right} arrow={view.arrow} spoken={view.spoken} />
          </div>
          <div className="mt-3 flex flex-wrap gap-x-5.5 gap-y-1 phone:flex-col">
            {view.checks.map((check) => (
              <SeverityMark key={check.text} severity={check.severity}>
                {check.text}
              </SeverityMark>
            ))}
          </div>
        </>
      )}
    </div>
  );
}

/** The sentence, and the text around the place with the place itself set apart. */
function Fault({
  typed,
  reading,
}: {
  typed: string;
  reading: Extract<ReactionReading, { status: "unreadable" }>;
}) {
  const { position, length, message } = reading;
  const place = typed.slice(position, position + length);
  const before = typed.slice(Math.max(0, position - 14), position);
  const after = typed.slice(position + length, position + length + 10);
  return (
    <>
      {message}{" "}
      {place.trim() !== "" && (
        <span className="whitespace-nowrap text-ink-2">
          {position > 14 && "…"}
          {before}
          <b className="text-stop underline">{place}</b>
          {after}
          {position + length + 10 < typed.length && "…"}
        </span>
      )}
    </>
  );
}
