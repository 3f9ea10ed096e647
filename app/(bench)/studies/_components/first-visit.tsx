import { ButtonLink } from "@/app/_ui/button";
import { SectionTitle } from "@/app/_ui/sheet";

/** Before there is a study of one's own: blank chart paper, the next act, and what happens then. */
export function FirstVisit() {
  return (
    <div className="grid grid-cols-[minmax(0,1.22fr)_minmax(0,1fr)] items-start gap-14 narrow:grid-cols-1 narrow:gap-8">
      <div className="rounded-control border border-dashed border-ctl px-6 pt-5 pb-6">
        <WaitingPaper />
        <h2 className="mt-4 font-serif text-[25px] leading-[1.25]">Bring a file of traces</h2>
        <p className="mt-1 mb-3 max-w-[52ch] text-ink-2">
          One time column and one column a run, or time and signal in pairs. CSV, TSV, a workbook, JCAMP-DX or
          a block copied from a spreadsheet. A name and a reaction come first; you see how the file was read
          before anything is stored.
        </p>
        <div className="flex flex-wrap gap-2">
          <ButtonLink kind="primary" href="/studies/new?then=import">
            Choose a file
          </ButtonLink>
          <ButtonLink href="/studies/new?then=paste">Paste columns</ButtonLink>
        </div>
      </div>
      <div>
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
      </div>
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

const PAPER = { width: 640, height: 200, step: 12.5 };
/** Dotted traces that could be: c(1 − e^(−t)) to four heights. */
const COURSES = [170, 116, 70, 38].map((height) =>
  Array.from({ length: 41 }, (_, i) => {
    const share = i / 40;
    const y = PAPER.height - (height * (1 - Math.exp(-1.9 * share))) / (1 - Math.exp(-1.9));
    return `${i === 0 ? "M" : "L"}${Math.round(share * PAPER.width * 0.95)} ${y.toFixed(1)}`;
  }).join(""),
);

function WaitingPaper() {
  const { width, height, step } = PAPER;
  const across = Array.from({ length: width / step }, (_, i) => `M${(i + 1) * step} 0V${height}`);
  const up = Array.from({ length: height / step }, (_, i) => `M0 ${i * step}H${width}`);
  return (
    <svg viewBox={`-1 0 ${width + 1} ${height + 1}`} aria-hidden="true" className="block h-auto w-full">
      <path d={[...across, ...up].join("")} stroke="var(--grid-minor)" fill="none" />
      {COURSES.map((course) => (
        <path
          key={course}
          d={course}
          stroke="var(--ctl)"
          strokeWidth="1.4"
          strokeDasharray="1.5 5"
          fill="none"
        />
      ))}
      <path d={`M0 0V${height}H${width}`} stroke="var(--ink)" strokeWidth="1.3" fill="none" />
    </svg>
  );
}
