import { clusterRobust } from "kinetics-core/inference";
import { type Estimate, estimateOf, type Flag, noEstimate } from "kinetics-core/quantities";
import type { GlobalFit } from "./global-fit";

/** Estimates of a fit with cluster-robust (CR2) standard errors, which do not lean on the model of the scatter. */
export interface RobustBeside {
  readonly logRateConstant: Estimate;
  /** Free parameters of the law by name. */
  readonly parameters: Readonly<Record<string, Estimate>>;
  /** Says where an interval is more than half wider than that of the model. */
  readonly flags: readonly Flag[];
}

/** Stands beside the intervals of the fit, never instead; without an interval there it has none either. */
export function robustBeside(fit: GlobalFit): RobustBeside {
  const { parameterNames, logRateConstant } = fit;
  const level = logRateConstant.level;
  const robust =
    fit.covariance === null
      ? null
      : clusterRobust(fit.information, fit.priors, fit.inference, parametersInWords(fit));
  const parts = robust?.status === "determined" ? robust.parameters : [];
  const at = (place: number, fitted: Estimate | undefined): Estimate => {
    const estimate = fitted?.estimate ?? null;
    const part = parts[place];
    return estimate === null
      ? noEstimate(level)
      : estimateOf(estimate, part?.standardError ?? null, part?.degreesOfFreedom ?? null, level);
  };
  const parameters: Record<string, Estimate> = {};
  parameterNames.forEach((name, place) => {
    const fitted = fit.parameters[name];
    // The scale stands last, and a species may bear its name.
    if (place > 0 && fitted !== undefined && !Object.hasOwn(parameters, name))
      parameters[name] = at(place, fitted);
  });
  return {
    logRateConstant: at(0, logRateConstant),
    parameters,
    flags: robust?.status === "determined" ? robust.flags : [],
  };
}

/** As findings name them: "the order in A" rather than "A". */
function parametersInWords({ parameterNames, orders }: GlobalFit): string[] {
  return parameterNames.map((name, place) => {
    if (place === 0) return name;
    if (Object.hasOwn(orders, name)) return `the order in ${name}`;
    return name === "scale" ? "the signal per concentration" : name;
  });
}
