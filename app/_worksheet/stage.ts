import { setImmediate } from "node:timers/promises";
import type { Kysely } from "kysely";
import type { z } from "zod";
import { keepAnalyses } from "@/db/analysis/analysis.commands";
import { readAnalyses } from "@/db/analysis/analysis.queries";
import { canonicalJson, sha256Of } from "@/db/canonical-json";
import type { Database } from "@/db/database";
import { CORE_VERSION } from "./core-version";

/**
 * A step of the analysis whose results outlive a page: kept under the hash of their inputs and the library's
 * version, first in memory, then in the database. What is kept may be dropped at any time; it is computed again.
 */
export interface Stage<Output> {
  readonly kind: string;
  /** Rows of the database are parsed like any other input. */
  readonly schema: z.ZodType<Output>;
  readonly recent: Map<string, Output>;
}

/** Results of one stage that stay in memory; a survey or a rate is some kilobytes. */
const KEPT_IN_MEMORY = 4000;

export function makeStage<Output>(kind: string, schema: z.ZodType<Output>): Stage<Output> {
  return { kind, schema, recent: new Map() };
}

/** One result per input, in their order; `compute` runs only for inputs that neither memory nor database knows. */
export async function keepStage<Input, Output>(
  db: Kysely<Database>,
  stage: Stage<Output>,
  inputs: readonly Input[],
  compute: (input: Input) => Promise<Output>,
): Promise<readonly Output[]> {
  const keys = inputs.map((input) => sha256Of(canonicalJson([CORE_VERSION, stage.kind, input])));
  const unknown = keys.filter((key) => !stage.recent.has(key));
  const stored = await readKept(db, stage, unknown);
  const made = new Map<string, Output>();
  const results: Output[] = [];
  for (const [index, input] of inputs.entries()) {
    const key = keys[index] ?? "";
    let result = stage.recent.get(key) ?? stored.get(key) ?? made.get(key);
    if (result === undefined) {
      result = await compute(input);
      // Between two traces whoever else asks the server is heard.
      await setImmediate();
      made.set(key, result);
    }
    remember(stage, key, result);
    results.push(result);
  }
  await writeKept(db, stage, made);
  return results;
}

function remember<Output>({ recent }: Stage<Output>, key: string, result: Output): void {
  recent.delete(key);
  recent.set(key, result);
  for (const oldest of recent.keys()) {
    if (recent.size <= KEPT_IN_MEMORY) break;
    recent.delete(oldest);
  }
}

async function readKept<Output>(
  db: Kysely<Database>,
  { schema }: Stage<Output>,
  keys: readonly string[],
): Promise<Map<string, Output>> {
  const kept = new Map<string, Output>();
  if (CORE_VERSION === null) return kept;
  for (const [key, json] of await readAnalyses(db, CORE_VERSION, keys)) {
    const parsed = schema.safeParse(json);
    // A row that no longer reads as what this build expects is as good as none: its result is made again.
    if (parsed.success) kept.set(key, parsed.data);
  }
  return kept;
}

async function writeKept<Output>(
  db: Kysely<Database>,
  { kind }: Stage<Output>,
  made: ReadonlyMap<string, Output>,
): Promise<void> {
  if (CORE_VERSION === null || made.size === 0) return;
  const analyses = [...made].map(([hash, result]) => ({ hash, kind, result }));
  await keepAnalyses(db, CORE_VERSION, analyses);
}
