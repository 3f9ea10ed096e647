import { fitStudy } from "./fitted-study";
import type { GlobalFitInput, GlobalFitOptions, GlobalFitResult } from "./global-fit";
import { prepareStudy } from "./prepare-study";
import { report } from "./report";

/**
 * Fits one rate law to all traces of a study at once: k and the law's parameters shared, an offset of its own for each
 * run, ε·l shared and observed, scatter of ln k between runs as part of the model. Concentrations, times and signals in
 * any units, the same throughout; k is returned in them.
 *
 * Throws nothing on data: a failure is a value that names the argument, what was found and what is accepted.
 */
export function fitGlobal(input: GlobalFitInput, options: GlobalFitOptions = {}): GlobalFitResult {
  const prepared = prepareStudy(input);
  if (prepared.status === "refused") return prepared.failure;
  const fit = fitStudy(prepared.study, input.level ?? 0.95, options);
  return fit.status === "refused" ? fit.failure : report(input, fit.fitted);
}
