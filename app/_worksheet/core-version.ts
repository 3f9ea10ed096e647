/**
 * Hash of the library's source at build time (next.config.mjs bakes it in). A stored result carries it, so that a
 * result of yesterday's library is never taken for today's. Null outside a build: scripts and tests then keep
 * results in memory only.
 */
export const CORE_VERSION: string | null = process.env.KINETICS_CORE_HASH ?? null;
