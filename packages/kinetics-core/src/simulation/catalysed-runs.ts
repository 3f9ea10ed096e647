import { progressTo } from "./simulated-trace";

/** Starting concentrations of what reacts and of a catalyst. */
export interface CatalysedRecipe {
  readonly a: number;
  readonly b: number;
}

/** Nine runs of v = k·aⁿ·b: a series in each, three runs off both, and a repeat of the base recipe. */
export const catalysedRecipes: readonly CatalysedRecipe[] = [
  { a: 1, b: 1 },
  { a: 2, b: 1 },
  { a: 4, b: 1 },
  { a: 1, b: 2 },
  { a: 1, b: 4 },
  { a: 2, b: 2 },
  { a: 4, b: 2 },
  { a: 2, b: 4 },
  { a: 1, b: 1 },
];

/**
 * k by which the fastest of the runs has converted `fastest` of its a after `duration`, and of every run its v/(k·a):
 * the reciprocal time on which a is used up, b·a^(n−1).
 */
export function catalysedSpeeds(
  recipes: readonly CatalysedRecipe[],
  {
    order,
    fastest,
    duration,
  }: { readonly order: number; readonly fastest: number; readonly duration: number },
): { readonly speeds: readonly number[]; readonly rateConstant: number } {
  const speeds = recipes.map(({ a, b }) => b * a ** (order - 1));
  return { speeds, rateConstant: progressTo(fastest, order) / (duration * Math.max(...speeds)) };
}
