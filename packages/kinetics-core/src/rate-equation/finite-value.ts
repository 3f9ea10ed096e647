import type { EquationValue } from "./rate-equation";

/** Zero times a finite number is zero, times any other NaN: one sum asks all of them without branching. */
export function isFiniteValue({ f, byConcentration, byParameter }: EquationValue): boolean {
  let probe = f * 0;
  for (let i = 0; i < byConcentration.length; i++) probe += (byConcentration[i] ?? 0) * 0;
  for (let j = 0; j < byParameter.length; j++) probe += (byParameter[j] ?? 0) * 0;
  return probe === 0;
}
