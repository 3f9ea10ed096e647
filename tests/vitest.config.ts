import path from "node:path";
import { defineConfig } from "vitest/config";

const repository = path.resolve(import.meta.dirname, "..");

export default defineConfig({
  root: repository,
  resolve: {
    alias: {
      "@": repository,
      // Next marks server modules with this package; under Vitest every module is on the server.
      "server-only": path.join(repository, "tests/server-only.ts"),
    },
  },
  test: {
    // A real SQLite file and argon2 in forks; the library needs nothing but numbers.
    pool: "forks",
    testTimeout: 30_000,
    include: [
      "packages/*/src/**/*.test.ts",
      "packages/*/bench/**/*.test.ts",
      "db/**/*.test.ts",
      "app/**/*.test.{ts,tsx}",
      "tests/*.test.ts",
      "tests/reference/**/*.test.ts",
    ],
  },
});
