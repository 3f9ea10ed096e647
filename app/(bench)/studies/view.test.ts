import { describe, expect, it } from "vitest";
import type { Check, StudyAnalysis } from "@/app/_worksheet/analysis";
import { exampleRun, exampleSheet } from "@/tests/example-sheet";
import { listLead, matches, type StudyRow, studyRow } from "./view";

const trace = { sha256: "b".repeat(64), points: 3, uploadId: null, column: "R01" };
const sheet = exampleSheet({
  runs: [
    exampleRun(0, { A: 1e-3, B: 2e-3 }, { trace, timeZeroSeconds: 1 }),
    exampleRun(1, { A: 1e-3, B: 4e-3 }, { setAside: { reason: "bubble", memberId: "m", at: "" } }),
  ],
});

function analysis(checks: readonly Check[] = []): StudyAnalysis {
  const mark = { series: "base", level: 0, levels: 1, repeat: false } as const;
  const rate = { kind: "entered", molarPerSecond: 1e-6, standardError: null } as const;
  return {
    hash: "",
    rule: null,
    runs: [
      { runId: "run-0", label: "R01", state: "standing", rate, mark },
      { runId: "run-1", label: "R02", state: "set-aside", rate, mark },
    ],
    law: { status: "no-law", missing: "Two more levels of B are needed.", fit: null },
    checks,
  };
}

function row(at: string, now: string) {
  return studyRow({
    study: { studyId: "s", number: 3, groupId: "g", revision: 2, sheet, updatedAt: at },
    analysis: analysis(),
    traces: new Map([[trace.sha256, { timeSeconds: [1, 2, 3], signal: [0, 5, 10] }]]),
    lastEntry: { at, by: ["AN", "LD"] },
    now: new Date(now),
  });
}

describe("studyRow", () => {
  it("tells runs, conditions, and when and by whom the study was last changed", () => {
    const today = row("2026-03-14T10:42:00.000Z", "2026-03-14T20:00:00.000Z");
    expect(today).toMatchObject({
      runs: 1,
      aside: 1,
      conditions: "25.0 °C, absorbance",
      lastEntry: "Today, 10:42",
      by: "AN, LD",
      checks: null,
    });
    expect(row("2026-03-12T10:42:00.000Z", "2026-03-14T20:00:00.000Z").lastEntry).toBe("12 Mar");
    expect(row("2025-12-31T10:42:00.000Z", "2026-03-14T20:00:00.000Z").lastEntry).toBe("31 Dec 2025");
  });

  it("draws standing traces from the time of mixing in the unit square", () => {
    const [thumbnail, ...more] = row("2026-03-14T10:42:00.000Z", "2026-03-14T20:00:00.000Z").thumbnail;
    expect(thumbnail).toMatchObject({ x: [0, 0.5, 1], y: [0, 0.5, 1] });
    expect(more).toEqual([]);
  });
});

describe("the list", () => {
  const one = row("2026-03-14T10:42:00.000Z", "2026-03-14T20:00:00.000Z");

  it("finds by every word, in name, species or conditions", () => {
    expect(matches(one, "")).toBe(true);
    expect(matches(one, "species B water")).toBe(true);
    expect(matches(one, "EXAMPLE")).toBe(true);
    expect(matches(one, "example iodine")).toBe(false);
  });

  it("counts studies and laws", () => {
    expect(listLead([one])).toBe("One study, none with a standing law yet.");
    const number = { value: "11.8", uncertainty: "0.3", power: 0 };
    const lawful: StudyRow = {
      ...one,
      law: {
        status: "law",
        expression: { constant: "*k*", factors: [] },
        constant: { symbol: "*k*", number, unit: "L mol^-1 s^-1" },
        internal: 11.8,
      },
    };
    expect(listLead([lawful, one])).toBe("Two studies, one with a standing law.");
    expect(listLead([lawful])).toBe("One study, with a standing law.");
  });
});
