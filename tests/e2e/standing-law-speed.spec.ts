import { expect, type JSHandle, type Page, test } from "@playwright/test";
import { entries } from "../access/entries";
import { makeNineRunStudy } from "./nine-runs";
import { signIn } from "./signed-in";

/**
 * The law follows the hand: setting a run aside stores a revision, refits and sends the station anew, and may take no
 * more than a few times what the least that an action can do takes here and now. That yardstick makes the test hold
 * on a slow or busy machine; the two are measured in turn, so that whatever else the machine does falls on both.
 */
const TIMES_A_BARE_ACTION = 6;
const ROUNDS = 20;

/**
 * The yardstick: an action of the same page that passes the same door (origin, session, role, input), finds the study
 * among those of the member's group, and then has nothing to do, since the run that it names is not on the sheet. It
 * writes nothing and revalidates nothing.
 */
const BARE_ACTION = "action app/(bench)/studies/[studyId]/runs/actions.ts#repeatRecipe";

// A recording copies the page at every step, which takes longer than what is measured.
test.use({ trace: "off", screenshot: "off" });

test("setting a run aside repaints the standing law within six times a bare action", async ({ page }) => {
  test.setTimeout(240_000);
  const { studyId, email } = await makeNineRunStudy("law-speed");
  await signIn(page, email);
  await page.goto(`/studies/${studyId}/runs`);
  const strip = page.getByRole("region", { name: "Standing law" });
  await expect(strip).toContainText("none set aside");

  const bare: number[] = [];
  const repaints: number[] = [];
  // One round more than is counted: the first one warms both ways up.
  for (let round = 0; round <= ROUNDS; round += 1) {
    const bareTook = await timeBareAction(page, studyId);
    const run = `R0${1 + (round % 9)}`;
    const repaintTook = await timeSettingAside(page, run);
    if (round > 0) {
      bare.push(bareTook);
      repaints.push(repaintTook);
    }
    await page.getByRole("checkbox", { name: `Select ${run}` }).check();
    await page.getByRole("button", { name: "Take back" }).click();
    await expect(strip).toContainText("none set aside");
  }

  const ratio = median(repaints) / median(bare);
  console.log(
    `Medians of ${ROUNDS}: a bare action ${median(bare).toFixed(1)} ms, setting aside until the law is repainted ${median(repaints).toFixed(1)} ms, ${ratio.toFixed(2)} times as long.`,
  );
  expect(ratio).toBeLessThan(TIMES_A_BARE_ACTION);
});

/** Milliseconds in the browser from the action's call to its answer. */
async function timeBareAction(page: Page, studyId: string): Promise<number> {
  const action = entries().find((entry) => entry.key === BARE_ACTION);
  if (action?.kind !== "action") throw new Error(`The build knows no ${BARE_ACTION}.`);
  const { took, answer } = await page.evaluate(
    async ({ actionId, input }) => {
      const from = performance.now();
      const response = await fetch(window.location.pathname, {
        method: "POST",
        headers: {
          Accept: "text/x-component",
          "Content-Type": "text/plain;charset=UTF-8",
          "Next-Action": actionId,
        },
        body: JSON.stringify([input]),
      });
      const text = await response.text();
      return { took: performance.now() - from, answer: text };
    },
    { actionId: action.actionId, input: { studyId, base: 1, runId: "a run that is not there" } },
  );
  // Past every check of access, and nothing done.
  expect(answer).toContain("is not on the sheet");
  return took;
}

/** Milliseconds in the browser from the press of the button to the change of the strip in the document. */
async function timeSettingAside(page: Page, run: string): Promise<number> {
  await page.getByRole("checkbox", { name: `Select ${run}` }).check();
  await page.getByRole("button", { name: "Set aside…" }).click();
  const dialog = page.getByRole("dialog");
  await dialog.getByLabel("Reason").fill("left standing too long");
  // The effect on the law is looked at first; actions of a page run one after the other.
  await expect(dialog.getByText("Then", { exact: true })).toBeVisible();
  const watch = await watchStrip(page);
  await dialog.getByRole("button", { name: `Set ${run} aside` }).click();
  const took = await watch.evaluate(({ repainted }) => repainted);
  await watch.dispose();
  await expect(dialog).toBeHidden();
  return took;
}

function watchStrip(page: Page): Promise<JSHandle<{ repainted: Promise<number> }>> {
  return page.evaluateHandle(() => {
    const strip = () => document.querySelector('section[aria-label="Standing law"]')?.textContent;
    const before = strip();
    const repainted = new Promise<number>((resolve) => {
      let from = Number.NaN;
      document.addEventListener(
        "click",
        () => {
          from = performance.now();
        },
        { capture: true, once: true },
      );
      new MutationObserver((_, observer) => {
        if (strip() === before) return;
        observer.disconnect();
        resolve(performance.now() - from);
      }).observe(document.body, { subtree: true, childList: true, characterData: true });
    });
    return { repainted };
  });
}

function median(values: readonly number[]): number {
  const sorted = values.toSorted((a, b) => a - b);
  const middle = sorted.length / 2;
  return ((sorted[Math.ceil(middle) - 1] ?? Number.NaN) + (sorted[Math.floor(middle)] ?? Number.NaN)) / 2;
}
