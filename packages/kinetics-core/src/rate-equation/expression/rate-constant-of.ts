import { type ExpressionFault, faultAt } from "./expression-fault";
import type { ExpressionNode } from "./expression-node";
import { type Degree, type ExpressionScaling, expressionScaling, genericValues } from "./expression-scaling";

/**
 * Which parameter is the rate constant of an expression v(c; p). The contract is v = k·f, and v is of that kind when it
 * doubles with k; or when it doubles with k and some others together, as k₁[A] + k₂[A][B] does with k₁ and k₂: then the
 * others are fitted as ratios to k, k₂/k₁, and f is v at k = 1. Sought is the least such set: with `k` where that is
 * written, else with the parameter that stands first. An expression that no parameter scales is taken as f, and k is
 * put before it. One that is scaled by a parameter to another power, [A]/τ, is refused: k would do the same again.
 */
export interface RateConstantOf {
  readonly name: string;
  /** False: put before the expression. */
  readonly written: boolean;
  /** Parameters that are fitted as ratios to it. */
  readonly ratios: readonly string[];
}

const RATE_CONSTANT = "k";

export function rateConstantOf(
  node: ExpressionNode,
  parameters: readonly string[],
): RateConstantOf | ExpressionFault {
  const scaling = expressionScaling(node, parameters, genericValues(parameters));
  const isWritten = parameters.includes(RATE_CONSTANT);
  for (const chosen of subsets(parameters, isWritten ? [RATE_CONSTANT] : [])) {
    const power = commonPower(scaling, parameters, chosen);
    if (power === null || power === 0) continue;
    if (Math.abs(power - 1) > SAME_DEGREE) return wrongPower(node, chosen, power);
    const [name = RATE_CONSTANT, ...ratios] = isWritten
      ? [RATE_CONSTANT, ...chosen.filter((one) => one !== RATE_CONSTANT)]
      : chosen;
    return { name, written: true, ratios };
  }
  return isWritten
    ? notAFactor(node, scaling, parameters)
    : { name: RATE_CONSTANT, written: false, ratios: [] };
}

/** Degrees are sums and products of a few numbers of order one. */
const SAME_DEGREE = 1e-9;

/** Power with which v grows when the chosen parameters grow together; null where it does not grow by a factor. */
function commonPower(
  { degree, demands }: ExpressionScaling,
  parameters: readonly string[],
  chosen: readonly string[],
): number | null {
  const columns = chosen.map((name) => parameters.indexOf(name) + 1);
  const together = (row: Degree) => columns.reduce((sum, column) => sum + (row[column] ?? 0), 0);
  const isMet = demands.every((demand) => Math.abs(together(demand.degree)) <= SAME_DEGREE);
  const power = together(degree);
  return isMet ? (Math.abs(power) <= SAME_DEGREE ? 0 : power) : null;
}

/** Subsets that hold `fixed`, small ones first, and among equals those that begin earlier in the text. */
function subsets(parameters: readonly string[], fixed: readonly string[]): readonly (readonly string[])[] {
  const all: (readonly string[])[] = [[]];
  for (const name of parameters.filter((one) => !fixed.includes(one))) {
    all.push(...all.map((set) => [...set, name]));
  }
  const inOrder = all.map((set) => parameters.filter((name) => fixed.includes(name) || set.includes(name)));
  const place = (set: readonly string[]) => parameters.indexOf(set[0] ?? "");
  return inOrder.filter((set) => set.length > 0).sort((a, b) => a.length - b.length || place(a) - place(b));
}

function wrongPower(node: ExpressionNode, chosen: readonly string[], power: number): ExpressionFault {
  const names = chosen.join(" and ");
  const exponent = Number(power.toPrecision(4)).toString().replace("-", "−");
  return faultAt(
    "rate-constant-not-a-factor",
    node,
    `The rate grows with ${names} to the power ${exponent}, so that a rate constant cannot be told from it. Write the rate constant k as a factor in its place.`,
  );
}

function notAFactor(
  node: ExpressionNode,
  scaling: ExpressionScaling,
  parameters: readonly string[],
): ExpressionFault {
  const column = parameters.indexOf(RATE_CONSTANT) + 1;
  const unmet = scaling.demands.find(({ degree }) => Math.abs(degree[column] ?? 0) > SAME_DEGREE);
  if (unmet?.of.kind === "operation" && (unmet.of.operator === "+" || unmet.of.operator === "-")) {
    const { left, right } = unmet.of;
    return faultAt(
      "rate-constant-not-a-factor",
      (unmet.degree[column] ?? 0) > 0 ? right : left,
      "The rate constant k multiplies one side of the sum and not this one. Write k before parentheses around the sum, or give this side a rate constant of its own.",
    );
  }
  return faultAt(
    "rate-constant-not-a-factor",
    unmet?.of ?? node,
    "The rate constant k must multiply the whole rate, and here it does not. Write k before the rest, and another name here.",
  );
}
