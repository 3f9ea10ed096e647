import { availableParallelism } from "node:os";
import { Worker } from "node:worker_threads";
import type { AnySection, Columns } from "./section";
import { joinColumns } from "./simulate-replicates";

/** Part of a cell, as a worker is asked for it. */
export interface Task {
  readonly section: string;
  readonly cell: number;
  readonly from: number;
  readonly to: number;
}

/** Short enough that no worker is left alone with a long end. */
const REPLICATES_A_TASK = 100;

/** All cells of a section on all cores; the figures do not depend on how many there are. */
export async function simulateOnWorkers(
  section: AnySection,
  replicates: number,
  progress: (done: number, of: number) => void,
): Promise<readonly Columns[]> {
  const tasks = tasksOf(section, replicates);
  const answers = new Map<Task, Columns>();
  let next = 0;
  const work = (worker: Worker) =>
    new Promise<void>((resolve, reject) => {
      let current: Task | undefined;
      const ask = () => {
        current = tasks[next++];
        if (current === undefined) resolve();
        else worker.postMessage(current);
      };
      worker.on("error", reject);
      worker.on("message", (columns: Columns) => {
        if (current !== undefined) answers.set(current, columns);
        progress(answers.size, tasks.length);
        ask();
      });
      ask();
    });
  const workers = Array.from(
    { length: Math.min(availableParallelism(), tasks.length) },
    () => new Worker(new URL("./worker.mjs", import.meta.url)),
  );
  try {
    await Promise.all(workers.map(work));
  } finally {
    await Promise.all(workers.map((worker) => worker.terminate()));
  }
  return section.cellNames.map((_, cell) =>
    joinColumns(tasks.filter((task) => task.cell === cell).map((task) => answers.get(task) ?? {})),
  );
}

function tasksOf(section: AnySection, replicates: number): readonly Task[] {
  return section.cellNames.flatMap((_, cell) =>
    Array.from({ length: Math.ceil(replicates / REPLICATES_A_TASK) }, (_, part) => ({
      section: section.name,
      cell,
      from: part * REPLICATES_A_TASK,
      to: Math.min((part + 1) * REPLICATES_A_TASK, replicates),
    })),
  );
}
