import localFont from "next/font/local";

/*
 * Source Sans 3 and STIX Two Text (both OFL 1.1) ship with the application. Each family comes in parts that the
 * browser walks in order: latin, latin-ext, greek, then the few signs that the web subsets lack, from the full file.
 * Ranges keep the browser from fetching a part to look for a sign that it does not hold.
 */
const sansLatin = localFont({
  src: [
    {
      path: "../../node_modules/@fontsource-variable/source-sans-3/files/source-sans-3-latin-wght-normal.woff2",
      weight: "200 900",
      style: "normal",
    },
    {
      path: "../../node_modules/@fontsource-variable/source-sans-3/files/source-sans-3-latin-wght-italic.woff2",
      weight: "200 900",
      style: "italic",
    },
  ],
  variable: "--sans-latin",
  adjustFontFallback: false,
});
const sansLatinExtended = localFont({
  src: [
    {
      path: "../../node_modules/@fontsource-variable/source-sans-3/files/source-sans-3-latin-ext-wght-normal.woff2",
      weight: "200 900",
      style: "normal",
    },
    {
      path: "../../node_modules/@fontsource-variable/source-sans-3/files/source-sans-3-latin-ext-wght-italic.woff2",
      weight: "200 900",
      style: "italic",
    },
  ],
  variable: "--sans-latin-ext",
  declarations: [
    {
      prop: "unicode-range",
      value:
        "U+0100-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1D00-1DBF, U+1E00-1EFF, U+20A0-20C0, U+2113, U+2C60-2C7F, U+A720-A7FF",
    },
  ],
  preload: false,
  adjustFontFallback: false,
});
const sansGreek = localFont({
  src: [
    {
      path: "../../node_modules/@fontsource-variable/source-sans-3/files/source-sans-3-greek-wght-normal.woff2",
      weight: "200 900",
      style: "normal",
    },
    {
      path: "../../node_modules/@fontsource-variable/source-sans-3/files/source-sans-3-greek-wght-italic.woff2",
      weight: "200 900",
      style: "italic",
    },
  ],
  variable: "--sans-greek",
  declarations: [{ prop: "unicode-range", value: "U+0370-03FF" }],
  preload: false,
  adjustFontFallback: false,
});
const sansFull = localFont({
  src: [
    {
      path: "../../node_modules/source-sans/WOFF2/VF/SourceSans3VF-Upright.ttf.woff2",
      weight: "200 900",
      style: "normal",
    },
    {
      path: "../../node_modules/source-sans/WOFF2/VF/SourceSans3VF-Italic.ttf.woff2",
      weight: "200 900",
      style: "italic",
    },
  ],
  variable: "--sans-full",
  preload: false,
  adjustFontFallback: false,
});
const serifLatin = localFont({
  src: [
    {
      path: "../../node_modules/@fontsource-variable/stix-two-text/files/stix-two-text-latin-wght-normal.woff2",
      weight: "400 700",
      style: "normal",
    },
    {
      path: "../../node_modules/@fontsource-variable/stix-two-text/files/stix-two-text-latin-wght-italic.woff2",
      weight: "400 700",
      style: "italic",
    },
  ],
  variable: "--serif-latin",
  adjustFontFallback: false,
});
const serifLatinExtended = localFont({
  src: [
    {
      path: "../../node_modules/@fontsource-variable/stix-two-text/files/stix-two-text-latin-ext-wght-normal.woff2",
      weight: "400 700",
      style: "normal",
    },
    {
      path: "../../node_modules/@fontsource-variable/stix-two-text/files/stix-two-text-latin-ext-wght-italic.woff2",
      weight: "400 700",
      style: "italic",
    },
  ],
  variable: "--serif-latin-ext",
  declarations: [
    {
      prop: "unicode-range",
      value:
        "U+0100-02BA, U+02BD-02C5, U+02C7-02CC, U+02CE-02D7, U+02DD-02FF, U+1D00-1DBF, U+1E00-1EFF, U+20A0-20C0, U+2113, U+2C60-2C7F, U+A720-A7FF",
    },
  ],
  preload: false,
  adjustFontFallback: false,
});
const serifGreek = localFont({
  src: [
    {
      path: "../../node_modules/@fontsource-variable/stix-two-text/files/stix-two-text-greek-wght-normal.woff2",
      weight: "400 700",
      style: "normal",
    },
    {
      path: "../../node_modules/@fontsource-variable/stix-two-text/files/stix-two-text-greek-wght-italic.woff2",
      weight: "400 700",
      style: "italic",
    },
  ],
  variable: "--serif-greek",
  declarations: [{ prop: "unicode-range", value: "U+0370-03FF" }],
  preload: false,
  adjustFontFallback: false,
});

/** Class names that put the parts' family names into CSS variables; tokens.css strings them together. */
export const fontVariables = [
  sansLatin,
  sansLatinExtended,
  sansGreek,
  sansFull,
  serifLatin,
  serifLatinExtended,
  serifGreek,
]
  .map((font) => font.variable)
  .join(" ");
