import { setUpFormOf } from "@/app/(bench)/studies/_set-up/set-up-form";
import type { World } from "./world";

/**
 * Who may enter where. Every page, route handler and server action has a line here; a new one without a line fails
 * the test. Addresses are filled in from the world by parameter name ([studyId] is `world.studyId`, and so on).
 */
export type Rule =
  /** Open to everybody; shows nothing of any group. `at` is the address to try where it cannot be guessed. */
  | { readonly who: "anyone"; readonly at?: string }
  /** Signed-in members; names no study or group, so everybody sees what is their own. */
  | { readonly who: "member" }
  /** Whoever holds a read-only link; any other token finds nothing, signed in or not. */
  | { readonly who: "link" }
  /** Members of the group that the study belongs to. `send` is what a member would send to a handler or action. */
  | { readonly who: "group"; readonly send?: (world: World) => unknown };

const anyone: Rule = { who: "anyone" };
const anyoneAt = (at: string): Rule => ({ who: "anyone", at });
const member: Rule = { who: "member" };
const link: Rule = { who: "link" };
const group = (send?: (world: World) => unknown): Rule =>
  send === undefined ? { who: "group" } : { who: "group", send };

const setUp = ({ studyId, revision, sheet }: World) => ({
  studyId,
  base: revision,
  form: setUpFormOf(sheet),
});

const ofRun = ({ studyId, revision, runId }: World) => ({ studyId, base: revision, runIds: [runId] });

export const rules: Readonly<Record<string, Rule>> = {
  // Pages
  "page /": anyone,
  "page /sign-in": anyone,
  "page /studies/[studyId]": group(),

  "page /studies": member,
  "page /studies/new": member,
  "page /studies/[studyId]/set-up": group(),
  "page /studies/[studyId]/standards": group(),
  "page /studies/[studyId]/runs": group(),
  "page /studies/[studyId]/runs/import": group(),
  "page /studies/[studyId]/runs/bench-sheet": group(),
  "page /studies/[studyId]/runs/mixing": group(),
  "page /studies/[studyId]/rates": group(),
  "page /studies/[studyId]/rate-law": group(),
  "page /studies/[studyId]/share": group(),

  "page /share/[token]": link,

  // Route handlers
  "GET /api/health": anyone,
  "GET /api/auth/[...nextauth]": anyoneAt("/api/auth/session"),
  "POST /api/auth/[...nextauth]": anyoneAt("/api/auth/signout"),

  "GET /share/[token]/runs.csv": link,
  "GET /share/[token]/traces.csv": link,
  "GET /studies/[studyId]/revision": group(),
  "GET /studies/[studyId]/rates/trace/[runId]": group(),
  "POST /api/v1/studies/[studyId]/uploads": group(),
  "GET /api/v1/studies/[studyId]/uploads/[uploadId]": group(),
  "DELETE /api/v1/studies/[studyId]/uploads/[uploadId]": group(),
  "POST /api/v1/studies/[studyId]/uploads/[uploadId]/preview": group(),
  "POST /api/v1/compute/calibration": member,
  "POST /api/v1/compute/global-fit": member,
  "POST /api/v1/compute/initial-rate": member,
  "POST /api/v1/compute/integrated-law": member,
  "POST /api/v1/compute/rate-law": member,
  "POST /api/v1/compute/saturation": member,
  "POST /api/v1/compute/temperature": member,
  "GET /api/v1/openapi.json": anyone,

  // Server actions, by file and exported name
  "action app/(bench)/actions.ts#signOut": member,
  "action app/(bench)/actions.ts#signOutEverywhere": member,
  "action app/(bench)/studies/new/actions.ts#makeStudy": member,
  "action app/(bench)/studies/_change/actions.ts#undoChange": group(({ studyId, revision }) => ({
    studyId,
    revision,
  })),
  "action app/(bench)/studies/[studyId]/set-up/actions.ts#previewSetUp": group(setUp),
  "action app/(bench)/studies/[studyId]/set-up/actions.ts#keepSetUp": group(setUp),
  "action app/(bench)/studies/[studyId]/standards/actions.ts#keepStandards": group(
    ({ studyId, revision }) => ({ studyId, base: revision, unit: "mmol/L", lines: "S1 1 0.1" }),
  ),
  "action app/(bench)/studies/[studyId]/standards/actions.ts#keepSettings": group(
    ({ studyId, revision }) => ({
      studyId,
      base: revision,
      unit: "mmol/L",
      speciesId: "",
      intercept: "none",
      weighting: "none",
      low: "",
      high: "",
      stock: "",
    }),
  ),
  "action app/(bench)/studies/[studyId]/standards/actions.ts#followLine": group(({ studyId, revision }) => ({
    studyId,
    base: revision,
    follow: true,
  })),
  "action app/(bench)/studies/[studyId]/standards/actions.ts#setStandardAside": group(
    ({ studyId, revision }) => ({ studyId, base: revision, standardId: "none", reason: "bends away" }),
  ),
  "action app/(bench)/studies/[studyId]/runs/actions.ts#previewAside": group(({ studyId, runId }) => ({
    studyId,
    runIds: [runId],
    aside: true,
  })),
  "action app/(bench)/studies/[studyId]/runs/actions.ts#setAside": group((world) => ({
    ...ofRun(world),
    reason: "bubble",
  })),
  "action app/(bench)/studies/[studyId]/runs/actions.ts#takeBack": group(ofRun),
  "action app/(bench)/studies/[studyId]/runs/actions.ts#putIntoBin": group(ofRun),
  "action app/(bench)/studies/[studyId]/runs/actions.ts#restoreFromBin": group(ofRun),
  "action app/(bench)/studies/[studyId]/runs/actions.ts#repeatRecipe": group(
    ({ studyId, revision, runId }) => ({
      studyId,
      base: revision,
      runId,
    }),
  ),
  "action app/(bench)/studies/[studyId]/runs/actions.ts#keepRows": group(({ studyId, revision, runId }) => ({
    studyId,
    base: revision,
    rows: [{ key: runId, runId, cells: { remark: "typed" } }],
  })),
  "action app/(bench)/studies/[studyId]/runs/mixing/actions.ts#keepVolumes": group(
    ({ studyId, revision, runId }) => ({
      studyId,
      base: revision,
      rows: [{ key: runId, runId, cells: { remark: "typed" } }],
    }),
  ),
  "action app/(bench)/studies/[studyId]/runs/mixing/actions.ts#keepStock": group(({ studyId, revision }) => ({
    studyId,
    base: revision,
    stockId: null,
    form: {
      symbol: "",
      name: "water",
      unit: "mmol/L",
      contents: {},
      fromStockId: "",
      taken: "",
      mark: "",
      lot: "",
      madeOn: "",
      howKnown: "",
    },
  })),
  "action app/(bench)/studies/[studyId]/runs/mixing/actions.ts#removeStock": group(
    ({ studyId, revision }) => ({
      studyId,
      base: revision,
      stockId: "no-such-stock",
    }),
  ),
  "action app/(bench)/studies/[studyId]/runs/mixing/actions.ts#keepDispensing": group(
    ({ studyId, revision }) => ({
      studyId,
      base: revision,
      form: { unit: "mL", mark: "3", upTo: "", absolute: "", percent: "0.5" },
    }),
  ),
  "action app/(bench)/studies/[studyId]/runs/import/actions.ts#storeTraces": group(
    ({ studyId, revision, uploadId }) => ({
      studyId,
      uploadId,
      base: revision,
      corrections: {},
      recipes: {},
    }),
  ),
  "action app/(bench)/studies/[studyId]/rates/actions.ts#saveWindow": group(
    ({ studyId, revision, runId }) => ({
      studyId,
      base: revision,
      runId,
      window: { fromSeconds: 0, toSeconds: 10 },
    }),
  ),
  "action app/(bench)/studies/[studyId]/rates/actions.ts#saveTraceMarks": group(
    ({ studyId, revision, runId }) => ({ studyId, base: revision, runId, deadTimeSeconds: 1 }),
  ),
  "action app/(bench)/studies/[studyId]/rates/actions.ts#saveSpikes": group(
    ({ studyId, revision, runId }) => ({ studyId, base: revision, runId, places: [1] }),
  ),
  "action app/(bench)/studies/[studyId]/rates/actions.ts#saveTimeZero": group(
    ({ studyId, revision, runId }) => ({ studyId, base: revision, runId, timeZeroSeconds: 1 }),
  ),
  "action app/(bench)/studies/[studyId]/rate-law/actions.ts#saveOrders": group(
    ({ studyId, revision, sheet }) => ({
      studyId,
      base: revision,
      orders: Object.fromEntries(sheet.species.filter((one) => one.inLaw).map((one) => [one.id, 1])),
    }),
  ),
  "action app/(bench)/studies/[studyId]/share/actions.ts#makeLink": group(({ studyId, revision }) => ({
    studyId,
    revision,
    label: "For checking",
    life: "7",
    shows: "live",
  })),
  "action app/(bench)/studies/[studyId]/share/actions.ts#revokeLink": group(({ studyId, linkId }) => ({
    studyId,
    linkId,
  })),
};
