import { existsSync } from "node:fs";

/**
 * Settings from .env, for commands that run outside Next, which reads the file by itself: all of them must open the
 * same database. What the environment already says stays.
 */
if (existsSync(".env")) {
  process.loadEnvFile(".env");
}
