import type { Metadata } from "next";
import { redirect } from "next/navigation";
import { currentMember } from "@/app/_server/session";
import { BrandMark } from "@/app/_ui/brand";
import { SignInFigure } from "./_components/sign-in-figure";
import { SignInForm } from "./_components/sign-in-form";
import { safeDestination } from "./refusal";

export const metadata: Metadata = { title: "Sign in" };

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<{ to?: string | string[] }>;
}) {
  const to = safeDestination((await searchParams).to);
  if ((await currentMember()) !== null) {
    redirect(to);
  }
  return (
    <main
      id="main"
      className="grid min-h-screen grid-cols-[minmax(0,1.32fr)_minmax(420px,1fr)] max-[820px]:grid-cols-1"
    >
      <section
        aria-hidden="true"
        className="relative overflow-hidden border-ink border-r-[3px] bg-sheet max-[820px]:hidden"
      >
        <SignInFigure />
        <div className="absolute top-14 right-10 left-[60px] max-w-[620px] font-serif">
          <p className="text-[52px] leading-[1.2] tracking-[-0.01em]">
            rate = <i>k</i>
            {"\u2009"}[A]
            <sup>
              <i>α</i>
            </sup>
            {"\u2009"}[B]
            <sup>
              <i>β</i>
            </sup>
          </p>
          <p className="mt-1 max-w-[34ch] text-[20px] text-ink-2 leading-[1.4]">
            From traces to a rate law, with its uncertainty and its checks in plain sight.
          </p>
        </div>
      </section>
      <section className="grid place-items-center p-10 max-[820px]:[place-items:start_center] max-[820px]:border-ink max-[820px]:border-t-[3px] max-[820px]:bg-sheet max-[820px]:px-[22px] max-[820px]:py-7">
        <div className="w-full max-w-[356px]">
          <p className="brand">
            <BrandMark />
            <span className="text-[22px]">Ratewright</span>
          </p>
          <h1 className="mt-11 mb-4 font-medium font-serif text-[30px] leading-[1.2]">Sign in</h1>
          <SignInForm to={to} />
          <p className="mt-6 text-ink-2 text-small">A shared study link needs no account.</p>
        </div>
      </section>
    </main>
  );
}
