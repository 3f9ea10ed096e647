import type { UndeterminedCombination } from "./global-fit";
import { NormalStep } from "./normal-step";

/**
 * The combinations of parameters that a normal matrix leaves open: for a column that the ones before it reproduce, the
 * vector that G sends to nothing, (−coefficients of the others, 1).
 */
export function undeterminedCombinations(
  gram: Float64Array,
  names: readonly string[],
): readonly UndeterminedCombination[] {
  const p = names.length;
  const solver = new NormalStep(p);
  const step = new Float64Array(p);
  solver.solve(gram, new Float64Array(p), 0, new Uint8Array(p), step);
  const open = names.flatMap((_, i) => (solver.idle[i] === 1 ? [i] : []));
  const held = new Uint8Array(p);
  for (const i of open) held[i] = 1;
  return open.map((i) => {
    const column = new Float64Array(p);
    for (let j = 0; j < p; j++) column[j] = gram[j * p + i] ?? 0;
    solver.solve(gram, column, 0, held, step);
    const combination: Record<string, number> = {};
    names.forEach((name, j) => {
      const value = j === i ? 1 : -(step[j] ?? 0);
      if (Math.abs(value) > 1e-6) combination[name] = value;
    });
    return { combination, message: sentence(Object.keys(combination), names[i] ?? "") };
  });
}

function sentence(together: readonly string[], name: string): string {
  if (together.length <= 1)
    return `The traces say nothing about ${name}. Hold it, or add a run in which it shows.`;
  const others = together.filter((one) => one !== name);
  return `The traces leave ${name} open against ${others.join(" and ")}: every change of it is undone by one of the others. Hold one of them, or add a run whose concentrations differ where these runs agree.`;
}
