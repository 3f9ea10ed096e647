import "server-only";
import { availableParallelism } from "node:os";
import path from "node:path";
import { Piscina } from "piscina";
import type * as Worker from "./pool.worker";

/** The one client of the server's worker pool: work of more than about 30 ms goes here, off the request path. */

declare global {
  // Next evaluates a module once for each bundle that holds it; the process must still have one pool.
  var ratewrightPool: Piscina | undefined;
}

type Tasks = typeof Worker;

function pool(): Piscina {
  globalThis.ratewrightPool ??= new Piscina({
    filename: path.join(/* turbopackIgnore: true */ process.cwd(), "dist/pool-worker.mjs"),
    minThreads: 0,
    maxThreads: Math.max(1, availableParallelism() - 1),
    // Pages come first: a long reading takes what they leave.
    niceIncrement: 10,
    idleTimeout: 30_000,
  });
  return globalThis.ratewrightPool;
}

/** Runs a function of the worker by its name. `moved` buffers change owner and are empty here afterwards. */
export async function runInPool<Name extends keyof Tasks>(
  name: Name,
  task: Parameters<Tasks[Name]>[0],
  moved: readonly ArrayBuffer[] = [],
): Promise<Awaited<ReturnType<Tasks[Name]>>> {
  return pool().run(task, { name, transferList: [...moved] });
}

/** What a computation may take, waiting for a thread included: far above any study of a bench. */
export const LONGEST_COMPUTATION_MS = 30_000;

/** As `runInPool`, for work whose length its input decides: at the deadline its thread is ended and the work lost. */
export async function runInPoolWithin<Name extends keyof Tasks>(
  name: Name,
  task: Parameters<Tasks[Name]>[0],
  milliseconds: number,
): Promise<
  | { readonly status: "done"; readonly value: Awaited<ReturnType<Tasks[Name]>> }
  | { readonly status: "too-long" }
> {
  const signal = AbortSignal.timeout(milliseconds);
  try {
    return { status: "done", value: await pool().run(task, { name, signal }) };
  } catch (error) {
    if (signal.aborted) return { status: "too-long" };
    throw error;
  }
}
