import { readdirSync, readFileSync, statSync } from "node:fs";
import path from "node:path";

export const REPOSITORY = path.resolve(import.meta.dirname, "../..");

/** Folders that hold code of ours; everything else at the top is made by tools. */
const ROOTS = ["app", "db", "migrations", "packages", "tests"];
const CODE = /\.(ts|tsx|mjs)$/;

export interface Import {
  /** As written, "./unit" or "kysely". */
  readonly specifier: string;
  /** Of ours: path from the repository without extension, "app/_ui/unit". Null for a package. */
  readonly target: string | null;
  /** Nothing of it is left when the types are gone. */
  readonly typeOnly: boolean;
}

/** Every source file of ours by its path from the repository, with "/" between folders. */
export function sourceFiles(): string[] {
  const files = ROOTS.filter((root) => exists(root)).flatMap((root) => below(root));
  const top = readdirSync(REPOSITORY).filter((name) => CODE.test(name) && !name.endsWith(".d.ts"));
  return [...files, ...top].sort();
}

export function readSource(file: string): string {
  return readFileSync(path.join(REPOSITORY, file), "utf8");
}

const STATEMENT = /\b(import|export)\s+(type\s+)?(?:([\w*{}\s,$]+?)\s+from\s+)?["']([^"'\n]+)["']/g;
const CALL = /\b(?:import|require)\(\s*["']([^"'\n]+)["']\s*\)/g;
const ASSET = /new URL\(\s*["'](\.[^"'\n]+)["']\s*,\s*import\.meta\.url/g;

/** Every import, re-export, dynamic import and worker address of a file, read as text. */
export function importsOf(file: string, source: string): Import[] {
  const code = withoutComments(source);
  const found: Import[] = [];
  for (const [, , typeWord, names, specifier] of code.matchAll(STATEMENT)) {
    if (specifier !== undefined) {
      const typeOnly = typeWord !== undefined || (names !== undefined && allNamesAreTypes(names));
      found.push({ specifier, target: resolve(file, specifier), typeOnly });
    }
  }
  for (const pattern of [CALL, ASSET]) {
    for (const [, specifier] of code.matchAll(pattern)) {
      if (specifier !== undefined) {
        found.push({ specifier, target: resolve(file, specifier), typeOnly: false });
      }
    }
  }
  return found;
}

/** `{ type A, type B }`: each name says that it is a type. */
function allNamesAreTypes(names: string): boolean {
  const braced = /^\s*\{([^}]*)\}\s*$/.exec(names)?.[1];
  if (braced === undefined) {
    return false;
  }
  const each = braced
    .split(",")
    .map((name) => name.trim())
    .filter((name) => name !== "");
  return each.length > 0 && each.every((name) => name.startsWith("type "));
}

function resolve(file: string, specifier: string): string | null {
  if (specifier.startsWith("@/")) {
    return withoutExtension(specifier.slice(2));
  }
  if (specifier.startsWith(".")) {
    return withoutExtension(path.posix.normalize(path.posix.join(path.posix.dirname(file), specifier)));
  }
  return null;
}

function withoutExtension(file: string): string {
  return file.replace(/\.(ts|tsx|mjs|js)$/, "").replace(/\/index$/, "");
}

/** Comments may speak of anything; strings that hold "//" survive because an address has ":" before it. */
export function withoutComments(source: string): string {
  return source.replace(/\/\*[\s\S]*?\*\//g, "").replace(/(^|[^:"'`\\])\/\/.*$/gm, "$1");
}

function below(folder: string): string[] {
  return readdirSync(path.join(REPOSITORY, folder), { withFileTypes: true }).flatMap((entry) => {
    if (entry.name === "node_modules" || entry.name === "dist") {
      return [];
    }
    const file = `${folder}/${entry.name}`;
    return entry.isDirectory() ? below(file) : CODE.test(entry.name) ? [file] : [];
  });
}

function exists(entry: string): boolean {
  return statSync(path.join(REPOSITORY, entry), { throwIfNoEntry: false }) !== undefined;
}
