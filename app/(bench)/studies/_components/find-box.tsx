"use client";

import { useRouter } from "next/navigation";
import { useEffect, useRef, useTransition } from "react";

const WAIT_MILLISECONDS = 180;

/** Searches as one types; without script the form asks the same question. */
export function FindBox({ asked }: { asked: string }) {
  const router = useRouter();
  const [, start] = useTransition();
  const timer = useRef<ReturnType<typeof setTimeout> | undefined>(undefined);
  useEffect(() => () => clearTimeout(timer.current), []);
  return (
    <search>
      <form action="/studies">
        <input
          name="find"
          type="search"
          className="input w-[290px] phone:w-full"
          aria-label="Find a study"
          placeholder="Find by name, species or wavelength"
          defaultValue={asked}
          autoComplete="off"
          onChange={(event) => {
            const question = event.target.value.trim();
            clearTimeout(timer.current);
            timer.current = setTimeout(() => {
              start(() =>
                router.replace(
                  question === "" ? "/studies" : `/studies?find=${encodeURIComponent(question)}`,
                ),
              );
            }, WAIT_MILLISECONDS);
          }}
        />
      </form>
    </search>
  );
}
