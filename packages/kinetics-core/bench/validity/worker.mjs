import { tsImport } from "tsx/esm/api";

// A thread of Node starts without the loader that reads TypeScript.
await tsImport("./worker.ts", import.meta.url);
