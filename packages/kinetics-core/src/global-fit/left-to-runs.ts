import { parametersLeftToRuns } from "kinetics-core/inference";
import type { PreparedStudy } from "./prepared-study";
import type { StudyPass } from "./study-pass";

/**
 * r: the parameters that only differences between runs determine, from the changes of concentration along the courses
 * of the last pass. A parameter that belongs to one species (an order) follows that species; one that belongs to none
 * follows the species of the law that changes most.
 */
export function leftToRuns(study: PreparedStudy, pass: StudyPass): number {
  const { changing } = study;
  const changes = changing.map((places) =>
    study.runs.map((run, j) => {
      const extent = pass.runs[j]?.lastExtent ?? 0;
      let most = 0;
      for (const place of places) {
        const start = run.concentrations[place] ?? 0;
        const change = Math.abs((study.stoichiometricNumbers[place] ?? 0) * extent);
        most = Math.max(most, start > 0 ? change / start : change > 0 ? 1 : 0);
      }
      return most;
    }),
  );
  return parametersLeftToRuns(changes);
}
