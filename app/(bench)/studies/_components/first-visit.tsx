import { BlankPaper } from "@/app/_figures/blank-paper";
import { ButtonLink } from "@/app/_ui/button";
import { SectionTitle } from "@/app/_ui/sheet";

/** Before there is a study of one's own: blank chart paper, the next act, and what happens then. */
export function FirstVisit() {
  return (
    <div className="grid grid-cols-[minmax(0,1.22fr)_minmax(0,1fr)] items-start gap-14 narrow:grid-cols-1 narrow:gap-8">
      <section className="rounded-control border border-dashed border-ctl px-6 pt-5 pb-6">
        <BlankPaper width={560} height={190} />
        <h2 className="mt-4 font-serif text-[25px] leading-[1.25]">Bring a file of traces</h2>
        <p className="mt-1 mb-3 max-w-[52ch] text-ink-2">
          One time column and one column a run, or time and signal in pairs. CSV, TSV or a block copied from a
          spreadsheet. A name and a reaction come first; you see how the file was read before anything is
          stored.
        </p>
        <div className="flex flex-wrap gap-2">
          <ButtonLink kind="primary" href="/studies/new?then=import">
            Choose a file
          </ButtonLink>
          <ButtonLink href="/studies/new?then=paste">Paste columns</ButtonLink>
        </div>
      </section>
      <section>
        <SectionTitle>What happens next</SectionTitle>
        <ol>
          <Step number={1} title="Name what was in each run">
            Starting concentrations, with their standard uncertainty where you know it.
          </Step>
          <Step number={2} title="Check the initial rates">
            A window is proposed for every trace. Drag it where you disagree.
          </Step>
          <Step number={3} title="Read the law">
            Orders and <i>k</i> with intervals, and the checks that could overturn them.
          </Step>
        </ol>
      </section>
    </div>
  );
}

function Step({ number, title, children }: { number: number; title: string; children: React.ReactNode }) {
  return (
    <li className="grid grid-cols-[30px_minmax(0,1fr)] border-t border-rule-2 py-3 first:border-t-0 first:pt-0">
      <span className="font-serif text-[22px] leading-[1.1] text-ink-2">{number}</span>
      <div>
        <b className="block text-[15.5px] font-semibold">{title}</b>
        <span className="text-small text-ink-2">{children}</span>
      </div>
    </li>
  );
}
