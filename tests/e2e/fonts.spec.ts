import { type CDPSession, expect, type Page, test } from "@playwright/test";
import { signInToDemoStudy } from "./demo-study";

/** A font that drew some glyphs of an element; `isCustomFont` is false for fonts of the machine. */
interface PlatformFont {
  readonly familyName: string;
  readonly isCustomFont: boolean;
  readonly glyphCount: number;
}

/**
 * Signs that the web subsets of the two families lack, others that laws, units and captions are written with, and the
 * spaces between them. ⇌ is in no family: it is drawn (app/_ui/prose.tsx) and must never be text.
 */
const SIGNS =
  "⁻⁰¹²³⁴⁵⁶⁷⁸⁹⁺ ₀₁₂₃₄₅₆₇₈₉₊₋ ‡ ≤ ≥ ≈ ≠ ∞ → ← ↔ − ± × · µμ Å ° ½ ¼ ¾ ∂ ∆ ∑ √ ‰ … – — ‘’ “” ΑΒΓΔΛΣΦΨΩ αβγδεζηθκλμνξπρσφχψω";
const SPACES = "a\u2009b\u2005c\u202fd\u00a0e\u2003f";
const WORDS = "k_0 L mol s Ångström Łódź naïve 0123456789 ΔAICc σ̂";

test.describe("the fonts that ship with the application", () => {
  // The specimen takes the page's place; nothing of the page may wake up later and put itself back.
  test.use({ javaScriptEnabled: false });

  test("draw every sign of a law, unit or caption, in both families, roman, italic and bold", async ({
    page,
  }) => {
    await page.goto("/sign-in");
    const cdp = await devTools(page);
    for (const family of ["--sans", "--serif"]) {
      for (const style of ["normal", "italic"]) {
        for (const weight of ["400", "600"]) {
          for (const text of [SIGNS, SPACES, WORDS]) {
            const fonts = await fontsOfSpecimen(page, cdp, { family, style, weight, text });
            expect(fonts.length, `${family} ${style} ${weight} drew nothing`).toBeGreaterThan(0);
            expect(fonts.filter((font) => !font.isCustomFont)).toEqual([]);
          }
        }
      }
    }
  });

  test("take ≤ ∞ → and the raised and lowered signs from Source Sans, also inside a law", async ({
    page,
  }) => {
    await page.goto("/sign-in");
    const cdp = await devTools(page);
    for (const family of ["--sans", "--serif"]) {
      for (const sign of ["∞", "→"]) {
        const fonts = await fontsOfSpecimen(page, cdp, {
          family,
          style: "normal",
          weight: "400",
          text: sign,
        });
        expect(fonts.map((font) => font.familyName)).toEqual([expect.stringMatching(/^Source ?Sans/)]);
      }
    }
    for (const sign of ["⁻", "⁰", "⁴", "₁", "‡", "≤"]) {
      const fonts = await fontsOfSpecimen(page, cdp, {
        family: "--sans",
        style: "normal",
        weight: "400",
        text: sign,
      });
      expect(fonts.map((font) => font.familyName)).toEqual([expect.stringMatching(/^Source ?Sans/)]);
    }
  });

  test("are told apart from a font of the machine, so that a missing sign would be seen", async ({
    page,
  }) => {
    await page.goto("/sign-in");
    const cdp = await devTools(page);
    await page.evaluate(() => document.documentElement.style.setProperty("--machine", "monospace"));
    const fonts = await fontsOfSpecimen(page, cdp, {
      family: "--machine",
      style: "normal",
      weight: "400",
      text: "k = 11.8",
    });
    expect(fonts.map((font) => font.isCustomFont)).toEqual([false]);
  });

  test("draw every text of the sign-in page", async ({ page }) => {
    await page.goto("/sign-in");
    await page.evaluate(() => document.fonts.ready);
    expect(await machineFontsOn(page)).toEqual([]);
  });
});

test("every text of every station is drawn by the fonts that ship with the application", async ({ page }) => {
  const study = await signInToDemoStudy(page);
  for (const station of ["set-up", "runs", "rates", "rate-law"]) {
    await page.goto(`${study}/${station}`);
    await page.evaluate(() => document.fonts.ready);
    expect(await machineFontsOn(page), station).toEqual([]);
  }
});

async function devTools(page: Page): Promise<CDPSession> {
  const cdp = await page.context().newCDPSession(page);
  await cdp.send("DOM.enable");
  await cdp.send("CSS.enable");
  return cdp;
}

/** Puts a text on the page in one of the application's families and asks the browser what drew it. */
async function fontsOfSpecimen(
  page: Page,
  cdp: CDPSession,
  specimen: { family: string; style: string; weight: string; text: string },
): Promise<readonly PlatformFont[]> {
  await page.evaluate(async ({ family, style, weight, text }) => {
    const element = document.createElement("p");
    element.id = "specimen";
    element.style.font = `${style} ${weight} 24px var(${family})`;
    element.textContent = text;
    document.body.replaceChildren(element);
    // Parts of a family are fetched when a sign first needs them.
    element.getBoundingClientRect();
    await document.fonts.ready;
  }, specimen);
  return fontsOf(cdp, "#specimen");
}

async function fontsOf(cdp: CDPSession, selector: string): Promise<readonly PlatformFont[]> {
  const { root } = await cdp.send("DOM.getDocument");
  const { nodeId } = await cdp.send("DOM.querySelector", { nodeId: root.nodeId, selector });
  const { fonts } = await cdp.send("CSS.getPlatformFontsForNode", { nodeId });
  return fonts;
}

/** Every element with text of its own that the machine's fonts helped to draw, with the text. */
async function machineFontsOn(page: Page): Promise<readonly string[]> {
  const cdp = await devTools(page);
  const marked = await page.evaluate(() => {
    const withText = [...document.body.querySelectorAll("*")].filter(
      (element) =>
        !["SCRIPT", "STYLE"].includes(element.tagName) &&
        [...element.childNodes].some((node) => node.nodeType === Node.TEXT_NODE && node.textContent?.trim()),
    );
    withText.forEach((element, index) => {
      element.setAttribute("data-specimen", String(index));
    });
    return withText.map((element) => element.textContent ?? "");
  });
  expect(marked.length).toBeGreaterThan(3);
  const guilty: string[] = [];
  for (const [index, text] of marked.entries()) {
    const fonts = await fontsOf(cdp, `[data-specimen="${index}"]`);
    const foreign = fonts.filter((font) => !font.isCustomFont && font.glyphCount > 0);
    if (foreign.length > 0) guilty.push(`${text}: ${foreign.map((font) => font.familyName).join(", ")}`);
  }
  return guilty;
}
