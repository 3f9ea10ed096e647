import type { Metadata } from "next";
import { requireMember } from "@/app/_server/session";
import { ButtonLink } from "@/app/_ui/button";
import { EmptyState } from "@/app/_ui/empty-state";
import { Sheet } from "@/app/_ui/sheet";
import { mayActAs } from "@/db/member/actor";
import { BenchHead } from "../../bench-head";
import { NewStudyForm } from "./_components/new-study-form";

export const metadata: Metadata = { title: "New study · Ratewright" };

/** Where to go once the study is made: its runs, or the import of traces at once. */
const NEXT = { import: "/runs/import", paste: "/runs/import#paste" } as const;

export default async function NewStudyPage({
  searchParams,
}: {
  searchParams: Promise<{ then?: string | string[] }>;
}) {
  const actor = await requireMember();
  const { then: wanted } = await searchParams;
  const next = wanted === "import" || wanted === "paste" ? NEXT[wanted] : "/runs";
  return (
    <>
      <BenchHead trail={[{ name: "Studies", href: "/studies" }, { name: "New study" }]} />
      {mayActAs(actor.role, "analyst") ? (
        <NewStudyForm next={next} />
      ) : (
        <Sheet title="Studies are made by analysts and leads">
          <EmptyState
            title="You read here"
            actions={<ButtonLink href="/studies">Back to the studies</ButtonLink>}
          >
            As a reader you can open every study of your group. Ask the lead if you should make one.
          </EmptyState>
        </Sheet>
      )}
    </>
  );
}
