import { describe, expect, it } from "vitest";
import { importsOf, readSource, sourceFiles, withoutComments } from "./architecture/imports";
import { objection, roomOf } from "./architecture/picture";

const files = sourceFiles().map((file) => ({ file, source: readSource(file) }));

function objectionsIn(file: string, source: string): string[] {
  return importsOf(file, source).flatMap((imported) => {
    const reason = objection(file, imported);
    return reason === null ? [] : [`${file} imports "${imported.specifier}": ${reason}`];
  });
}

describe("the tree", () => {
  it("is read at all", () => {
    expect(files.map(({ file }) => file)).toEqual(
      expect.arrayContaining(["app/layout.tsx", "db/connect.ts", "proxy.ts", "migrations/index.ts"]),
    );
  });

  it("imports along the picture only", () => {
    expect(files.flatMap(({ file, source }) => objectionsIn(file, source))).toEqual([]);
  });

  it("has no barrel that exports everything", () => {
    expect(matching(/^\s*export\s+\*/m)).toEqual([]);
  });

  it("has no any", () => {
    const withoutStrings = (source: string) => withoutComments(source).replace(/"(?:[^"\\\n]|\\.)*"/g, '""');
    expect(matching(/(:|\bas|<|\||&|,|=>)\s*any\b(?!\s*\()/, withoutStrings)).toEqual([]);
  });

  it("silences neither the compiler nor the linter", () => {
    expect(matching(/@ts-(ignore|expect-error|nocheck)|biome-ignore/, (source) => source)).toEqual([]);
  });

  it("has no drawer for odds and ends", () => {
    const odd = /(^|\/)(utils?|helpers?|common|misc)(\/|\.[a-z]+$|\.[a-z]+\.[a-z]+$)/;
    expect(files.map(({ file }) => file).filter((file) => odd.test(file))).toEqual([]);
  });

  it("keeps every file short enough to read", () => {
    const long = files.filter(
      ({ file, source }) => !file.includes(".test.") && source.split("\n").length > 400,
    );
    expect(long.map(({ file }) => file)).toEqual([]);
  });
});

/** Files whose code matches, this file and its parts left out, since they hold the patterns themselves. */
function matching(pattern: RegExp, prepare = withoutComments): string[] {
  return files
    .filter(({ file }) => !file.startsWith("tests/architecture"))
    .filter(({ source }) => pattern.test(prepare(source)))
    .map(({ file }) => file);
}

describe("the picture", () => {
  it.each([
    ["packages/kinetics-core/src/rate-law/fit.ts", 'import { readFileSync } from "node:fs";'],
    ["packages/kinetics-core/src/rate-law/fit.ts", 'import type { Sheet } from "@/db/sheet/sheet.schema";'],
    ["packages/kinetics-core/src/rate-law/fit.ts", 'import { z } from "zod";'],
    ["packages/kinetics-core/bench/floor.ts", 'import { fit } from "../src/global-fit/fit";'],
    ["packages/kinetics-core/bench/floor.ts", 'import { z } from "zod";'],
    ["app/_worksheet/analyse.ts", 'import { floorLoop } from "../../packages/kinetics-core/bench/floor";'],
    ["migrations/2026-12-01-first.ts", 'import { sheet } from "../db/sheet/sheet.schema";'],
    ["db/run/run.queries.ts", 'import { cache } from "react";'],
    ["db/run/run.queries.ts", 'import { env } from "../../app/_server/env";'],
    ["db/run/run.queries.ts", 'import { fitRateLaw } from "kinetics-core/rate-law";'],
    ["app/_ui/value.tsx", 'import type { Sheet } from "@/db/sheet/sheet.schema";'],
    ["app/_ui/value.tsx", 'import { requireMember } from "@/app/_server/session";'],
    ["app/_figures/trace-figure.tsx", 'import { evaluateCurve } from "kinetics-core/initial-rate";'],
    ["app/_worksheet/analyse.ts", 'import { view } from "@/app/(bench)/studies/[studyId]/rates/view";'],
    ["app/(bench)/studies/[studyId]/rates/view.ts", 'import type { P } from "./_components/plot";'],
    ["app/(bench)/studies/[studyId]/rates/page.tsx", 'import { x } from "../runs/view";'],
    ["app/(bench)/studies/[studyId]/rates/page.tsx", 'const x = await import("../runs/view");'],
    ["app/(bench)/studies/page.tsx", 'import { x } from "./[studyId]/runs/view";'],
  ])("objects to %s with %s", (file, line) => {
    expect(objectionsIn(file, line)).toHaveLength(1);
  });

  it.each([
    ["packages/kinetics-core/src/rate-law/fit.ts", 'import { solve } from "../linear-algebra";'],
    [
      "packages/kinetics-core/src/rate-law/draws.ts",
      'import { xoroshiro128plus } from "pure-rand/generator";',
    ],
    ["packages/kinetics-core/src/rate-law/fit.test.ts", 'import { readFileSync } from "node:fs";'],
    ["packages/kinetics-core/bench/floor.ts", 'import { performance } from "node:perf_hooks";'],
    ["packages/kinetics-core/bench/floor.ts", 'import { fitRateLaw } from "kinetics-core/rate-law";'],
    ["db/run/run.queries.ts", 'import type { InitialRate } from "kinetics-core/initial-rate";'],
    ["db/run/run.queries.ts", 'import { type InitialRate } from "kinetics-core/initial-rate";'],
    ["app/_ui/toast.tsx", 'import type { ActionResult } from "@/app/_server/action-result";'],
    ["app/(bench)/studies/[studyId]/rates/_components/plot.tsx", 'import type { RatesView } from "../view";'],
    ["app/(bench)/studies/[studyId]/rates/_components/plot.tsx", 'import { saveWindow } from "../actions";'],
    ["app/(bench)/studies/[studyId]/rates/page.tsx", 'import { x } from "../../schema";'],
    ["app/api/v1/openapi.json/document.ts", 'import { registry } from "../compute/registry";'],
    ["app/(bench)/studies/[studyId]/rates/page.tsx", '// import { x } from "../runs/view";'],
  ])("has nothing against %s with %s", (file, line) => {
    expect(objectionsIn(file, line)).toEqual([]);
  });

  it("finds the room of a file", () => {
    expect(roomOf("app/(bench)/studies/[studyId]/rates/_components/plot")).toBe(
      "app/(bench)/studies/[studyId]/rates",
    );
    expect(roomOf("app/_ui/value")).toBeNull();
    expect(roomOf("app/layout")).toBeNull();
  });
});
