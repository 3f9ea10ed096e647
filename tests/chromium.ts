import { existsSync } from "node:fs";

/** Debian's package; elsewhere CHROMIUM_PATH says where it is. */
const INSTALLED = "/usr/bin/chromium";

/** What keeps a test browser quiet and off the network, and lets it run as root in a container. */
export const CHROMIUM_ARGUMENTS = [
  "--no-sandbox",
  "--disable-gpu",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
];

export interface Chromium {
  readonly executable: string;
  /** Where its shared libraries lie, when it brings them itself. */
  readonly libraries: string | null;
}

/** CHROMIUM_PATH, else the installed one, else the one that came with the packages and needs no system libraries. */
export async function findChromium(): Promise<Chromium> {
  const named = process.env.CHROMIUM_PATH;
  if (named !== undefined && named !== "") {
    if (!existsSync(named)) {
      throw new Error(`CHROMIUM_PATH names ${named}, which is not there.`);
    }
    return { executable: named, libraries: null };
  }
  if (existsSync(INSTALLED)) {
    return { executable: INSTALLED, libraries: null };
  }
  // Read by the package when it loads: which of its library sets to unpack.
  process.env.AWS_LAMBDA_JS_RUNTIME = "nodejs20.x";
  const before = process.env.LD_LIBRARY_PATH;
  const { default: packed } = await import("@sparticuz/chromium");
  const executable = await packed.executablePath();
  const libraries = process.env.LD_LIBRARY_PATH ?? null;
  // For the browser only: the server must not load them.
  if (before === undefined) {
    delete process.env.LD_LIBRARY_PATH;
  } else {
    process.env.LD_LIBRARY_PATH = before;
  }
  return { executable, libraries };
}
