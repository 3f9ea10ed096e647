import { afterAll, beforeAll, expect, test } from "vitest";
import { verifySignIn } from "../account/sign-in";
import { verifyChainOfGroup } from "../audit/chain-verdict";
import { actorOfAccount } from "../member/member.queries";
import { prepareDatabase } from "../prepare";
import { listRevisions } from "../revision/revision.queries";
import type { Sheet } from "../sheet/sheet.schema";
import { listStudies, readStudy } from "../study/study.queries";
import { type TemporaryDatabase, temporaryDatabase } from "../testing/temporary-database";
import { readTraces } from "../trace/read-trace";
import { openUpload } from "../upload/upload.queries";
import { DEMO_RUNS, demoCsv, demoReadings, esterLeft, TRUTH } from "./alkaline-hydrolysis";
import { DEMO_EMAIL, renewDemoPassword } from "./make-demo";

let temporary: TemporaryDatabase;
let password: string;

beforeAll(async () => {
  temporary = await temporaryDatabase();
  password = (await prepareDatabase(temporary.file, { demo: true })).demo?.password ?? "";
});
afterAll(() => temporary.close());

async function demo(): Promise<{
  sheet: Sheet;
  studyId: string;
  lead: NonNullable<Awaited<ReturnType<typeof actorOfAccount>>>;
}> {
  const account = await temporary.db
    .selectFrom("account")
    .select("id")
    .where("email", "=", DEMO_EMAIL)
    .executeTakeFirstOrThrow();
  const lead = await actorOfAccount(temporary.db, account.id);
  if (lead === undefined) throw new Error("the demo lead is a member");
  const [study] = await listStudies(temporary.db, lead);
  if (study === undefined) throw new Error("the demo group has a study");
  const open = await readStudy(temporary.db, lead, study.studyId);
  if (open === undefined) throw new Error("the demo study opens");
  return { sheet: open.sheet, studyId: study.studyId, lead };
}

test("a first start makes the demo sign-in with a random password, a second start keeps it", async () => {
  expect(password).toMatch(/^([a-z2-9]{4}-){3}[a-z2-9]{4}$/);
  expect(await verifySignIn(temporary.db, DEMO_EMAIL, password)).toBeDefined();
  expect(await prepareDatabase(temporary.file, { demo: true })).toEqual({
    demo: { email: DEMO_EMAIL, password: null },
  });
  expect(await verifySignIn(temporary.db, DEMO_EMAIL, password)).toBeDefined();
  const { lead } = await demo();
  expect(await listStudies(temporary.db, lead)).toHaveLength(1);
});

test("without the demo a first start makes nobody", async () => {
  const other = await temporaryDatabase();
  try {
    expect(await prepareDatabase(other.file, { demo: false })).toEqual({ demo: null });
    expect(await other.db.selectFrom("account").select("id").execute()).toEqual([]);
  } finally {
    await other.close();
  }
});

test("the study is marked as invented, and nine of its eleven runs stand", async () => {
  const { sheet } = await demo();
  expect(sheet.study.invented).toBe(true);
  expect(sheet.runs.map((run) => run.label)).toEqual(DEMO_RUNS.map((run) => run.label));
  const aside = sheet.runs.filter((run) => run.setAside !== null);
  expect(aside.map((run) => [run.label, run.setAside?.reason])).toEqual([
    ["R07", "bubble at 6 s"],
    ["R11", "cell 1.8 °C warm"],
  ]);
});

test("its atoms and charges balance with the stoichiometric numbers given", async () => {
  const { sheet } = await demo();
  const charge = sheet.species.reduce((sum, one) => sum + one.stoichiometricNumber * one.charge, 0);
  expect(charge).toBe(0);
});

test("every stored trace is the readings of the file, and the file is kept byte for byte", async () => {
  const { sheet, studyId, lead } = await demo();
  const traces = await readTraces(
    temporary.db,
    sheet.runs.flatMap((run) => (run.trace === null ? [] : [run.trace.sha256])),
  );
  for (const readings of demoReadings()) {
    const run = sheet.runs.find((one) => one.label === readings.label);
    const trace = traces.get(run?.trace?.sha256 ?? "");
    expect([...(trace?.timeSeconds ?? [])]).toEqual(readings.timeSeconds);
    expect([...(trace?.signal ?? [])]).toEqual(readings.absorbance);
  }
  const file = await openUpload(temporary.db, lead, { studyId, uploadId: sheet.uploads[0]?.id ?? "" });
  if (file === undefined) throw new Error("the file is kept");
  const pieces: Uint8Array[] = [];
  for await (const piece of file.bytes()) pieces.push(piece);
  expect(Buffer.concat(pieces).toString("utf8")).toBe(demoCsv());
});

test("the readings follow the differential equations that they claim to", () => {
  // Fourth-order Runge–Kutta on d[A]/dt = −k[A][B], d[B]/dt = −2k[A][B] against the closed form.
  for (const run of DEMO_RUNS) {
    const slope = (a: number) => -TRUTH.rateConstant * a * (run.hydroxideMolar - 2 * (run.esterMolar - a));
    let ester = run.esterMolar;
    const step = 0.01;
    for (let done = 0; done < 2000; done++) {
      const k1 = slope(ester);
      const k2 = slope(ester + (step / 2) * k1);
      const k3 = slope(ester + (step / 2) * k2);
      const k4 = slope(ester + step * k3);
      ester += (step / 6) * (k1 + 2 * k2 + 2 * k3 + k4);
    }
    expect(Math.abs(esterLeft(run, TRUTH.rateConstant, 20) / ester - 1)).toBeLessThan(1e-9);
    expect(Math.abs(esterLeft(run, TRUTH.rateConstant, 0) / run.esterMolar - 1)).toBeLessThan(1e-12);
  }
});

test("the same seed gives the same readings", () => {
  expect(demoCsv()).toBe(demoCsv());
  const points = demoReadings().map((run) => run.timeSeconds.length);
  expect(points).toEqual([692, 592, 392, 292, 232, 392, 392, 392, 392, 392, 592]);
});

test("its history has four revisions in a chain that holds", async () => {
  const { studyId, lead } = await demo();
  const revisions = await listRevisions(temporary.db, lead, studyId);
  expect(revisions.map((revision) => revision.summary)).toEqual([
    "R11 set aside: cell 1.8 °C warm.",
    "R07 set aside: bubble at 6 s.",
    "R01, R02, R03, R04, R05 and 6 more runs added.",
    "Study 1 created: Alkaline hydrolysis of 4-nitrophenyl acetate",
  ]);
  expect(await verifyChainOfGroup(temporary.db, lead.groupId)).toMatchObject({ status: "holds", entries: 8 });
});

test("a new password for the demo people replaces the old one", async () => {
  const renewed = (await renewDemoPassword(temporary.db)) ?? "";
  expect(await verifySignIn(temporary.db, DEMO_EMAIL, password)).toBeUndefined();
  expect(await verifySignIn(temporary.db, DEMO_EMAIL, renewed)).toBeDefined();
});
