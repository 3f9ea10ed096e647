import { expressionEquation, type RateEquation } from "kinetics-core/rate-equation";
import { median } from "kinetics-core/summation";
import type { BenchmarkStudy } from "./benchmark-study";
import { fitOrThrow, inputOf } from "./our-fit";
import { leastTimeOf } from "./stopwatch";

export interface Expression {
  readonly text: string;
  /** Time of a fit with the user's expression over that with the same law built in. */
  readonly ratio: number;
}

const TEXT = "k [A]^a [B]^b";
const ROUNDS = 15;
const REPEATS = 5;
const WARM_UPS = 30;
/** Both ways are the same fit: their ln k differ by no more than this. */
const SAME = 1e-6;

export function measureExpression(study: BenchmarkStudy, progress: (message: string) => void): Expression {
  progress(`the expression ${TEXT}`);
  const own = inputOf(study);
  const written = inputOf(study, { equation: equationOf(TEXT) });
  const apart = Math.abs(logRateConstant(own) - logRateConstant(written));
  if (!(apart < SAME)) throw new Error(`${TEXT} differs from the law built in by ${apart} in ln k`);
  leastTimeOf(WARM_UPS, () => fitOrThrow(own));
  leastTimeOf(WARM_UPS, () => fitOrThrow(written));
  const rounds = Array.from({ length: ROUNDS }, () => {
    const time = leastTimeOf(REPEATS, () => fitOrThrow(own));
    return leastTimeOf(REPEATS, () => fitOrThrow(written)) / time;
  });
  return { text: TEXT, ratio: median(rounds) };
}

function logRateConstant(input: ReturnType<typeof inputOf>): number {
  return fitOrThrow(input).logRateConstant.estimate ?? Number.NaN;
}

function equationOf(text: string): RateEquation {
  const made = expressionEquation(text, { species: ["A", "B"] });
  if (made.status !== "equation") throw new Error(made.message);
  return made.equation;
}
