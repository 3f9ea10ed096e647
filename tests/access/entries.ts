import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { z } from "zod";

const REPOSITORY = path.resolve(import.meta.dirname, "../..");
const METHOD = /^export\s+(?:async\s+)?(?:function|const)\s+(GET|HEAD|POST|PUT|PATCH|DELETE)\b/gm;
const METHOD_LIST = /^export\s+(?:const\s+)?\{([^}]*)\}/gm;

/** A way into the server. `key` is what the table of rules knows it by. */
export type Entry =
  | { readonly kind: "page"; readonly key: string; readonly route: string }
  | { readonly kind: "handler"; readonly key: string; readonly route: string; readonly method: string }
  /** `route` is a page that holds the action: a call from elsewhere is handed on within the server. */
  | { readonly kind: "action"; readonly key: string; readonly route: string; readonly actionId: string };

/** Every page and handler that there is a file for, and every action that the build knows. */
export function entries(): Entry[] {
  const files = filesBelow("app");
  const pages = files
    .filter((file) => /\/page\.tsx?$/.test(file))
    .map((file): Entry => ({ kind: "page", key: `page ${routeOf(file)}`, route: routeOf(file) }));
  const handlers = files
    .filter((file) => /\/route\.tsx?$/.test(file))
    .flatMap((file) =>
      methodsOf(readFileSync(path.join(REPOSITORY, file), "utf8")).map((method): Entry => {
        const route = routeOf(file);
        return { kind: "handler", key: `${method} ${route}`, route, method };
      }),
    );
  return [...pages, ...handlers, ...actions()];
}

/** "app/(bench)/studies/[studyId]/page.tsx" is "/studies/[studyId]": groups and slots are no part of an address. */
export function routeOf(file: string): string {
  const folders = file.split("/").slice(1, -1);
  return `/${folders.filter((folder) => !/^[(@]/.test(folder)).join("/")}`;
}

export function methodsOf(source: string): string[] {
  const declared = [...source.matchAll(METHOD)].map(([, method]) => method);
  const listed = [...source.matchAll(METHOD_LIST)].flatMap(([, names = ""]) =>
    names.split(",").map((name) => /\b(GET|HEAD|POST|PUT|PATCH|DELETE)\s*$/.exec(name.trim())?.[1]),
  );
  return [...declared, ...listed].filter((method): method is string => method !== undefined);
}

const manifest = z.object({
  node: z.record(
    z.string(),
    z.object({
      filename: z.string(),
      exportedName: z.string(),
      workers: z.record(z.string(), z.unknown()),
    }),
  ),
  edge: z.record(z.string(), z.unknown()),
});

function actions(): Entry[] {
  const file = path.join(REPOSITORY, ".next/server/server-reference-manifest.json");
  const { node, edge } = manifest.parse(JSON.parse(readFileSync(file, "utf8")));
  if (Object.keys(edge).length > 0) {
    throw new Error("An action runs on the edge runtime, which has no database.");
  }
  return Object.entries(node).map(([actionId, { filename, exportedName, workers }]) => ({
    kind: "action",
    key: `action ${filename}#${exportedName}`,
    route: routeOf(Object.keys(workers)[0] ?? ""),
    actionId,
  }));
}

function filesBelow(folder: string): string[] {
  return readdirSync(path.join(REPOSITORY, folder), { withFileTypes: true }).flatMap((entry) => {
    // A folder with an underscore is no part of the routes, whatever its files are called.
    if (entry.name.startsWith("_")) {
      return [];
    }
    return entry.isDirectory() ? filesBelow(`${folder}/${entry.name}`) : [`${folder}/${entry.name}`];
  });
}
