import type { RateEquation, SimplerLaw } from "./rate-equation";

/**
 * How `extension` turns into `law`: the parameter whose added term the data would have to need, or null where `law` is
 * not nested in it. Laws are the same when they have the same text: it holds the form, the species and the held orders.
 */
export function simplerLawIn(
  extension: Pick<RateEquation, "simpler">,
  law: Pick<RateEquation, "law">,
): SimplerLaw | null {
  return extension.simpler.find(({ equation }) => equation.law === law.law) ?? null;
}
