import type { Config } from "tailwindcss";

/**
 * Tailwind speaks the drawing's own tokens and no others: a colour, size or family that is not here cannot be
 * written as a utility. The values live in app/tokens.css, in light and dark at once.
 */
export default {
  content: ["./app/**/*.{ts,tsx}"],
  theme: {
    colors: {
      transparent: "transparent",
      current: "currentColor",
      desk: "var(--desk)",
      sheet: "var(--sheet)",
      well: "var(--well)",
      ink: { DEFAULT: "var(--ink)", 2: "var(--ink-2)", 3: "var(--ink-3)" },
      rule: { DEFAULT: "var(--rule)", 2: "var(--rule-2)" },
      ctl: "var(--ctl)",
      mark: { DEFAULT: "var(--mark)", soft: "var(--mark-soft)", line: "var(--mark-line)" },
      stop: "var(--stop)",
      warn: "var(--warn)",
      note: "var(--note)",
      ok: "var(--ok)",
    },
    fontFamily: { sans: "var(--sans)", serif: "var(--serif)" },
    fontSize: {
      label: ["12.5px", "1.3"],
      caption: ["13.5px", "1.4"],
      table: ["14.5px", "1.4"],
      small: ["14px", "1.42"],
      body: ["15px", "1.45"],
      section: ["16px", "1.3"],
      verdict: ["21px", "1.42"],
      title: ["27px", "1.2"],
      law: ["29px", "1.28"],
      page: ["34px", "1.18"],
    },
    borderRadius: { none: "0", control: "3px", full: "9999px" },
    boxShadow: { none: "none", raised: "var(--shadow)" },
  },
} satisfies Config;
