/** What the person chose; "system" follows the operating system. */
export type Theme = "system" | "light" | "dark";

export const THEME_COOKIE = "theme";

/** Reads the cookie's text; anything unknown follows the system. */
export function themeOf(text: string | undefined): Theme {
  return text === "light" || text === "dark" ? text : "system";
}
