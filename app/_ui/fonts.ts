import localFont from "next/font/local";

/*
 * Source Sans 3 and STIX Two Text (both OFL 1.1) ship with the application. Each family comes in parts that the
 * browser walks in order: latin, latin-ext, greek, then the few signs that the web subsets lack, from the full file.
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
