import type { Metadata, Viewport } from "next";
import { cookies, headers } from "next/headers";
import type { ReactNode } from "react";
import { fontVariables } from "./_ui/fonts";
import { StyleNonce } from "./_ui/style-nonce";
import { THEME_COOKIE, themeOf } from "./_ui/theme";
import "./globals.css";

export const metadata: Metadata = {
  title: { default: "Ratewright", template: "%s · Ratewright" },
  description: "A stack of runs goes in, a rate law comes out that a collaborator can check.",
};

export const viewport: Viewport = {
  width: "device-width",
  initialScale: 1,
  themeColor: [
    { media: "(prefers-color-scheme: light)", color: "#edf0ea" },
    { media: "(prefers-color-scheme: dark)", color: "#0b0f0e" },
  ],
};

/**
 * The plot library writes its rules into style elements of these ids; where they exist it fills or skips them instead
 * of adding its own, which the content security policy would refuse. Neither may be empty.
 */
const PLOT_STYLE_IDS = [
  "plotly.js-style-global",
  "ce8d464691048653ffe3a57c6c18ab566e8366f186677868cf724621a857b4fe",
];

/** The first paint already knows the theme (a cookie, else the system) and carries the response's nonce. */
export default async function RootLayout({ children }: { children: ReactNode }) {
  const theme = themeOf((await cookies()).get(THEME_COOKIE)?.value);
  const nonce = (await headers()).get("x-nonce") ?? undefined;
  return (
    <html lang="en" data-theme={theme === "system" ? undefined : theme} className={fontVariables}>
      <head>
        {PLOT_STYLE_IDS.map((id) => (
          <style key={id} id={id} nonce={nonce} suppressHydrationWarning>
            {".js-plotly-plot{position:relative}"}
          </style>
        ))}
      </head>
      <body>
        <StyleNonce nonce={nonce} />
        {children}
      </body>
    </html>
  );
}
