import { Button } from "@/app/_ui/button";
import { Field } from "@/app/_ui/field";
import { typeset } from "@/app/_ui/prose";
import { SectionTitle } from "@/app/_ui/sheet";
import type { StandardsView } from "../view";

/** Signals of one solution into its concentration: a plain form, which works without script and gives an address to keep. */
export function ReadingForm({ view }: { view: StandardsView }) {
  const { reading, quantity } = view;
  return (
    <section id="reading" className="scroll-mt-28 border-t-2 border-ink pt-3">
      <SectionTitle note={`${quantity} to concentration`}>Inverse reading</SectionTitle>
      <form action="#reading" className="flex flex-wrap items-end gap-x-3 gap-y-2">
        <div className="min-w-48 flex-1">
          <Field
            key={reading?.typed ?? ""}
            label="Readings of one solution"
            name="reading"
            inputMode="text"
            defaultValue={reading?.typed ?? ""}
            placeholder="0.547 0.551"
          />
        </div>
        <Button type="submit">Read</Button>
      </form>
      {reading !== null && (
        <div role="status" className="mt-2.5">
          <p className="law text-[22px]">{typeset(reading.answer)}</p>
          <p className="hint">{typeset(reading.detail)}</p>
        </div>
      )}
    </section>
  );
}
