"use client";

import { signIn } from "next-auth/react";
import { type FormEvent, useState } from "react";
import { signInRefusal } from "../refusal";

const INPUT =
  "block h-11 w-full rounded-control border border-ctl bg-sheet px-3 text-[16px] text-ink focus-visible:outline-offset-1";
const LABEL = "mt-3.5 mb-1.5 block font-semibold text-small";

/** @param to the path on this server that the visitor wanted. */
export function SignInForm({ to }: { to: string }) {
  const [message, setMessage] = useState<string | null>(null);
  const [pending, setPending] = useState(false);

  async function submit(event: FormEvent<HTMLFormElement>) {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    setPending(true);
    setMessage(null);
    try {
      const answer = await signIn("credentials", {
        redirect: false,
        email: String(form.get("email") ?? ""),
        password: String(form.get("password") ?? ""),
      });
      if (answer?.ok) {
        // A whole page load: nothing that was drawn for somebody signed out stays behind.
        window.location.assign(to);
        return;
      }
      setMessage(signInRefusal(answer?.error ?? null));
    } catch {
      setMessage("The server could not be reached. Check your connection and try again.");
    }
    setPending(false);
  }

  return (
    <form onSubmit={submit} method="post">
      <label htmlFor="email" className={LABEL}>
        Email address
      </label>
      <input
        id="email"
        name="email"
        type="email"
        autoComplete="username"
        required
        className={INPUT}
        aria-describedby={message === null ? undefined : "sign-in-refusal"}
      />
      <label htmlFor="password" className={LABEL}>
        Password
      </label>
      <input
        id="password"
        name="password"
        type="password"
        autoComplete="current-password"
        required
        className={INPUT}
        aria-describedby={message === null ? undefined : "sign-in-refusal"}
      />
      <p id="sign-in-refusal" role="alert" className="mt-3 text-small text-stop empty:hidden">
        {message}
      </p>
      <button type="submit" disabled={pending} className="button primary mt-7 min-h-11 w-full text-[15.5px]">
        {pending ? "Signing in" : "Sign in"}
      </button>
    </form>
  );
}
