import type { Import } from "./imports";

/**
 * Who may know whom:
 *
 *   components -> view types <- view.ts <- page -> queries -> db
 *                               actions, route handlers -> commands -> db
 *                               actions, _worksheet, workers -> kinetics-core
 *   db -> kinetics-core types only;  kinetics-core -> numeric packages only;  its bench -> kinetics-core, Node
 */
const NUMERIC_PACKAGES = new Set(["ml-levenberg-marquardt", "ml-regression", "pure-rand"]);

const isTest = (file: string) => /\.test\.tsx?$/.test(file) || file.startsWith("tests/");

/** Drawn by React, fed with plain props: rooms' components, and the two shared kits. */
const isComponent = (file: string) => /\/_components\//.test(file) || /^app\/(_ui|_figures)\//.test(file);

/** @returns what is wrong with this import of this file, as a sentence, or null. */
export function objection(file: string, imported: Import): string | null {
  if (isTest(file)) {
    return null;
  }
  return (
    coreObjection(file, imported) ??
    benchObjection(file, imported) ??
    migrationObjection(file, imported) ??
    dbObjection(file, imported) ??
    componentObjection(file, imported) ??
    viewObjection(file, imported) ??
    roomObjection(file, imported)
  );
}

function coreObjection(file: string, { specifier, target }: Import): string | null {
  if (!file.startsWith("packages/kinetics-core/src/")) {
    return null;
  }
  if (target !== null) {
    return target.startsWith("packages/kinetics-core/src/")
      ? null
      : "kinetics-core knows nothing outside itself";
  }
  return specifier.startsWith("kinetics-core/") || NUMERIC_PACKAGES.has(specifier.split("/")[0] ?? "")
    ? null
    : "kinetics-core imports numeric packages only";
}

const BENCH = "packages/kinetics-core/bench/";

/** What bundles the benchmark as it ships, and what lets its threads read TypeScript. */
const BENCH_TOOLS = new Set(["esbuild", "tsx/esm/api"]);

/** The bench measures the library through the doors that everybody uses, and nobody rests on the bench. */
function benchObjection(file: string, { specifier, target }: Import): string | null {
  if (!file.startsWith(BENCH)) {
    return target?.startsWith(BENCH) ? "the bench measures the library and is no part of it" : null;
  }
  if (target !== null) {
    return target.startsWith(BENCH) ? null : "the bench reaches kinetics-core by its concepts";
  }
  return /^(kinetics-core\/|node:)/.test(specifier) || BENCH_TOOLS.has(specifier)
    ? null
    : "the bench imports kinetics-core, Node and what starts it only";
}

function migrationObjection(file: string, { specifier, target }: Import): string | null {
  if (!file.startsWith("migrations/")) {
    return null;
  }
  if (target !== null) {
    return target.startsWith("migrations/")
      ? null
      : "a migration stands as it was written and imports nothing of ours";
  }
  return specifier === "kysely" ? null : "a migration imports kysely only";
}

function dbObjection(file: string, { specifier, target, typeOnly }: Import): string | null {
  if (!file.startsWith("db/")) {
    return null;
  }
  if (target?.startsWith("app/")) {
    return "db knows nothing of the application above it";
  }
  if (/^(next|next-auth|react|react-dom|server-only)(\/|$)/.test(specifier)) {
    return "db imports neither Next nor React";
  }
  return specifier.startsWith("kinetics-core/") && !typeOnly
    ? "db takes only types from kinetics-core"
    : null;
}

function componentObjection(file: string, { specifier, target, typeOnly }: Import): string | null {
  if (!isComponent(file)) {
    return null;
  }
  if (target?.startsWith("db/") || specifier === "kysely") {
    return "components take plain props from view.ts and know no tables";
  }
  if (target?.startsWith("app/_server/") && !typeOnly) {
    return "components decide nothing about access: the page or the action does";
  }
  return specifier.startsWith("kinetics-core/") && !typeOnly
    ? "components compute nothing: the worksheet, a worker or view.ts does"
    : null;
}

function viewObjection(file: string, { target }: Import): string | null {
  const isView = /(^|[/.])view\.ts$/.test(file);
  return isView && target?.includes("/_components/") ? "a view is made without knowing who draws it" : null;
}

/** A route room uses itself, the rooms that it lies in, and the shared app/_… folders. */
function roomObjection(file: string, { target }: Import): string | null {
  if (!target?.startsWith("app/")) {
    return null;
  }
  const from = roomOf(file);
  const to = roomOf(target);
  if (to === null) {
    return null;
  }
  if (from === null) {
    return file.startsWith("app/_") ? "shared folders know no room" : null;
  }
  return from === to || from.startsWith(`${to}/`) ? null : `this room reaches into ${to}`;
}

/** The route folder that a file or target belongs to; null for app/_… and for what lies in no room. */
export function roomOf(file: string): string | null {
  if (!file.startsWith("app/") || file.startsWith("app/_")) {
    return null;
  }
  const folders = file.split("/").slice(0, -1);
  const inner = folders.findIndex((folder) => folder.startsWith("_"));
  const room = (inner === -1 ? folders : folders.slice(0, inner)).join("/");
  // The HTTP API is one room: its description has to know every part of it.
  return room === "app" ? null : room.replace(/^(app\/api\/v\d+)\/.*$/, "$1");
}
