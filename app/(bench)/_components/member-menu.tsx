"use client";

import { useState } from "react";
import type { ActionResult } from "@/app/_server/action-result";
import type { Theme } from "@/app/_ui/theme";
import { ThemeToggle } from "@/app/_ui/theme-toggle";
import { signOut, signOutEverywhere } from "../actions";

/** Who is signed in, and the way out. A disclosure rather than a menu: it holds two buttons and opens by itself. */
export function MemberMenu({
  name,
  initials,
  role,
  theme,
}: {
  name: string;
  initials: string;
  role: string;
  theme: Theme;
}) {
  const [message, setMessage] = useState<string | null>(null);
  async function run(action: (input: unknown) => Promise<ActionResult<unknown>>) {
    const result = await action(null);
    // After success the action has already led to the sign-in page.
    setMessage(result.ok ? null : result.message);
  }
  return (
    <details className="relative">
      <summary
        className="grid size-7 cursor-pointer list-none place-items-center rounded-full border border-ctl font-semibold text-[12px] [&::-webkit-details-marker]:hidden"
        aria-label={`Signed in as ${name}, ${initials}`}
      >
        {initials}
      </summary>
      <div className="absolute top-9 right-0 z-30 w-60 rounded-control border border-ctl bg-sheet p-4 text-small shadow-raised">
        <p className="font-semibold">{name}</p>
        <p className="text-ink-2">{`Signed in as ${role}`}</p>
        <p className="my-3">
          <ThemeToggle theme={theme} />
        </p>
        <form action={() => run(signOut)}>
          <button type="submit" className="button w-full">
            Sign out
          </button>
        </form>
        <form action={() => run(signOutEverywhere)} className="mt-2">
          <button type="submit" className="button w-full">
            Sign out everywhere
          </button>
        </form>
        <p className="mt-2 text-caption text-ink-2">
          Everywhere ends your sessions on all devices. Personal tokens keep working.
        </p>
        {message !== null && (
          <p role="alert" className="mt-2 text-stop">
            {message}
          </p>
        )}
      </div>
    </details>
  );
}
