import { type ChildProcessByStdio, execFileSync, spawn } from "node:child_process";
import { createInterface } from "node:readline";
import type { Readable, Writable } from "node:stream";
import { fileURLToPath } from "node:url";
import type { BenchmarkStudy } from "./benchmark-study";

/** What another implementation found, and how long its fit alone took by its own clock. */
export interface PeerFit {
  readonly seconds: number;
  /** Of these, the time in which it had a processor. */
  readonly processorSeconds: number;
  readonly logRateConstant: number;
  readonly orders: readonly number[];
  readonly scale: number;
  /** Of ln k, the orders and the scale. */
  readonly standardErrors: readonly number[];
  readonly betweenRuns: number;
}

export interface PeerScript {
  readonly script: string;
  readonly argument: string | null;
}

/** A script in `peers`, kept running, so that neither the start of Python nor the reading of data is timed. */
export class Peer {
  private readonly process: ChildProcessByStdio<Writable, Readable, null>;
  private readonly lines: AsyncIterator<string>;

  private constructor({ script, argument }: PeerScript) {
    const path = fileURLToPath(new URL(`./peers/${script}`, import.meta.url));
    this.process = spawn("python3", ["-B", path, ...(argument === null ? [] : [argument])], {
      stdio: ["pipe", "pipe", "inherit"],
      // One thread, as we have: the arrays are too small for more to help.
      env: { ...process.env, OPENBLAS_NUM_THREADS: "1", OMP_NUM_THREADS: "1", MKL_NUM_THREADS: "1" },
    });
    this.lines = createInterface({ input: this.process.stdout })[Symbol.asyncIterator]();
  }

  static async start(script: PeerScript, study: BenchmarkStudy): Promise<Peer> {
    const peer = new Peer(script);
    await peer.ask({ study: asMessage(study) });
    return peer;
  }

  async fit(): Promise<PeerFit> {
    const answer = await this.ask({ fit: true });
    if (!isPeerFit(answer)) throw new Error(`A peer answered ${JSON.stringify(answer)} instead of a fit`);
    return answer;
  }

  stop(): void {
    this.process.stdin.end();
    this.process.kill();
  }

  private async ask(message: object): Promise<unknown> {
    this.process.stdin.write(`${JSON.stringify(message)}\n`);
    const line = await this.lines.next();
    if (line.done === true) throw new Error("A peer ended before it answered; its own message stands above.");
    return JSON.parse(line.value);
  }
}

function asMessage({ runs, scale, scaleError }: BenchmarkStudy) {
  return {
    a: runs.map((run) => run.a),
    b: runs.map((run) => run.b),
    time: runs.map((run) => Array.from(run.time)),
    signal: runs.map((run) => Array.from(run.signal)),
    scale,
    scaleError,
  };
}

function isPeerFit(value: unknown): value is PeerFit {
  return (
    typeof value === "object" &&
    value !== null &&
    "seconds" in value &&
    typeof value.seconds === "number" &&
    "processorSeconds" in value &&
    typeof value.processorSeconds === "number" &&
    "logRateConstant" in value &&
    typeof value.logRateConstant === "number" &&
    "orders" in value &&
    Array.isArray(value.orders) &&
    "standardErrors" in value &&
    Array.isArray(value.standardErrors)
  );
}

export interface PeerVersions {
  readonly python: string;
  readonly numpy: string;
  readonly scipy: string;
}

/** Versions of what the peers need, or null with the reason where python3 or one of its packages is absent. */
export function peerVersions(): { readonly versions: PeerVersions | null; readonly absent: string | null } {
  const script =
    "import json, platform, numpy, scipy; print(json.dumps([platform.python_version(), numpy.__version__, scipy.__version__]))";
  try {
    const answer = execFileSync("python3", ["-c", script], {
      encoding: "utf8",
      stdio: ["ignore", "pipe", "pipe"],
    });
    const [python, numpy, scipy]: string[] = JSON.parse(answer);
    return { versions: { python: python ?? "", numpy: numpy ?? "", scipy: scipy ?? "" }, absent: null };
  } catch (error) {
    const last = error instanceof Error ? error.message.trim().split("\n").at(-1) : String(error);
    return {
      versions: null,
      absent: `python3 with NumPy and SciPy is not here (${last ?? "no answer"}), so the comparisons with them are left out.`,
    };
  }
}
