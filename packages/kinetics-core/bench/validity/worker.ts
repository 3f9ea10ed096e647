import { parentPort } from "node:worker_threads";
import { sectionNamed } from "./sections";
import type { Task } from "./simulate-on-workers";
import { simulateReplicates } from "./simulate-replicates";

parentPort?.on("message", ({ section, cell, from, to }: Task) => {
  const found = sectionNamed(section);
  if (found === null) throw new RangeError(`There is no section ${section}`);
  parentPort?.postMessage(simulateReplicates(found, cell, from, to));
});
