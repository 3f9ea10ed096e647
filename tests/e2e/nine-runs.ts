import { randomBytes } from "node:crypto";
import { readFileSync } from "node:fs";
import path from "node:path";
import { connect } from "@/db/connect";
import { demoSetUp } from "@/db/demo/demo-set-up";
import type { Actor } from "@/db/member/actor";
import { addTraces } from "@/db/run/add-traces";
import { makeGroup } from "@/db/testing/make-group";
import { makeStudy } from "@/db/testing/make-study";
import { browserRun } from "../browser-run";

/** The file that a person would upload, and what is true of it: see fixtures/make-nine-runs.ts. */
export const NINE_RUNS_FILE = path.join(import.meta.dirname, "fixtures/nine-runs.csv");

export const TRUTH = {
  /** L mol⁻¹ s⁻¹, with an order of one in A and in B. */
  rateConstant: 11.8,
  /** ε·l in L mol⁻¹. */
  perMolar: 17_900,
  /** What u(ε·l) is said to be in the tests; the file itself has none. */
  perMolarUncertainty: 70,
  /** Standard deviation of a run's own k about the true one, relative. */
  scatter: 0.02,
} as const;

export interface TrueRun {
  readonly label: string;
  readonly molarA: number;
  readonly molarB: number;
  /** k·[A]₀·[B]₀ in mol L⁻¹ s⁻¹. */
  readonly molarPerSecond: number;
  readonly timeSeconds: readonly number[];
  readonly absorbance: readonly number[];
}

/** The runs of the file: a line of remark, two of concentrations, one of names, then time and nine signals. */
export function nineRuns(): TrueRun[] {
  const [, lineA = "", lineB = "", names = "", ...readings] = readFileSync(NINE_RUNS_FILE, "utf8")
    .trim()
    .split("\n");
  const rows = readings.map((line) => line.split(",").map(Number));
  return names
    .split(",")
    .slice(1)
    .map((label, index) => {
      const column = index + 1;
      const molarA = Number(lineA.split(",")[column]) * 1e-6;
      const molarB = Number(lineB.split(",")[column]) * 1e-3;
      return {
        label,
        molarA,
        molarB,
        molarPerSecond: TRUTH.rateConstant * molarA * molarB,
        timeSeconds: rows.map((row) => row[0] ?? Number.NaN),
        absorbance: rows.map((row) => row[column] ?? Number.NaN),
      };
    });
}

export interface NineRunStudy {
  readonly studyId: string;
  readonly name: string;
  readonly lead: Actor;
  /** Signs in the lead, with TEST_PASSWORD. */
  readonly email: string;
}

/**
 * A study of a group of its own on the running server, with the nine runs of the file.
 *
 * @param spec keeps the groups of several test files apart; lower case.
 */
export async function makeNineRunStudy(spec: string): Promise<NineRunStudy> {
  const db = connect(browserRun().databaseFile);
  try {
    // A test that is repeated makes its study anew.
    const domain = `${spec}-${randomBytes(3).toString("hex")}.example`;
    const { lead } = await makeGroup(db, domain);
    const { ester, hydroxide, ...setUp } = demoSetUp();
    const name = `Nine runs for ${domain}`;
    const { perMolar, perMolarUncertainty } = TRUTH;
    const studyId = await makeStudy(db, lead, {
      ...setUp,
      study: { ...setUp.study, name },
      signal: {
        kind: "calibrated",
        quantity: "Absorbance",
        unit: "",
        perMolar: { value: perMolar, standardUncertainty: perMolarUncertainty },
        blank: null,
      },
    });
    const stored = await addTraces(
      db,
      lead,
      { studyId, base: 1 },
      {
        uploadId: null,
        reading: "One time column in s, one column of absorbance a run.",
        runs: nineRuns().map((run, index) => ({
          label: run.label,
          column: `column ${index + 2}, ${run.label}`,
          concentrations: {
            [ester]: { molar: run.molarA, relativeUncertainty: 0 },
            [hydroxide]: { molar: run.molarB, relativeUncertainty: 0 },
          },
          trace: {
            timeSeconds: Float64Array.from(run.timeSeconds),
            signal: Float64Array.from(run.absorbance),
          },
        })),
      },
    );
    if (stored.status !== "changed") throw new Error(`The nine runs were not stored: ${stored.status}.`);
    return { studyId, name, lead, email: `lead@${domain}` };
  } finally {
    await db.destroy();
  }
}
