import { Constant, LawExpression } from "@/app/_ui/law";
import { Prose } from "@/app/_ui/prose";
import type { LawSnapshot } from "@/app/_worksheet/law-effect";

/** The law before and after a change that is being asked about. Highlighted is what stands, which is still the first. */
export function LawBeforeAfter({ before, after }: { before: LawSnapshot; after: LawSnapshot }) {
  return (
    <dl className="my-3 grid grid-cols-[auto_minmax(0,1fr)] items-baseline gap-x-4 gap-y-2 border-y border-rule py-3">
      <dt className="text-caption text-ink-3">Now</dt>
      <dd>
        <Snapshot law={before} marked />
      </dd>
      <dt className="text-caption text-ink-3">Then</dt>
      <dd>
        <Snapshot law={after} marked={false} />
      </dd>
    </dl>
  );
}

function Snapshot({ law, marked }: { law: LawSnapshot; marked: boolean }) {
  if (law.status === "no-law") {
    return (
      <span>
        No law. <Prose text={law.missing} />
      </span>
    );
  }
  return (
    <span className="flex flex-wrap items-baseline gap-x-4 text-[19px]">
      <LawExpression law={law.expression} />
      <Constant constant={law.constant} marked={marked} />
    </span>
  );
}
