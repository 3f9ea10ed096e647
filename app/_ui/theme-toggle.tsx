"use client";

import { useState } from "react";
import { THEME_COOKIE, type Theme, themeOf } from "./theme";

const A_YEAR_IN_SECONDS = 31_536_000;

/** Light, dark, or as the system says. Kept in a cookie, so that the server's first paint is already right. */
export function ThemeToggle({ theme }: { theme: Theme }) {
  const [chosen, setChosen] = useState(theme);
  function choose(next: Theme) {
    setChosen(next);
    if (next === "system") delete document.documentElement.dataset.theme;
    else document.documentElement.dataset.theme = next;
    // The Cookie Store API is not in every browser we serve.
    document.cookie = `${THEME_COOKIE}=${next}; path=/; max-age=${A_YEAR_IN_SECONDS}; samesite=lax`;
  }
  return (
    <label className="inline-flex items-center gap-2 text-caption text-ink-2">
      Appearance
      <select
        className="select w-auto"
        value={chosen}
        onChange={(event) => choose(themeOf(event.target.value))}
      >
        <option value="system">As the system</option>
        <option value="light">Light</option>
        <option value="dark">Dark</option>
      </select>
    </label>
  );
}
