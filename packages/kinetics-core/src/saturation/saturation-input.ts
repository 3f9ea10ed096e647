import type { SaturationInput, SaturationResult } from "./saturation";

/** What cannot be fitted at all, or null. */
export function refusalOf({ concentrations, rates }: SaturationInput): SaturationResult | null {
  const bad = (place: keyof SaturationInput, message: string): SaturationResult => ({
    status: "bad-input",
    place,
    message,
  });
  if (rates.length !== concentrations.length)
    return bad(
      "rates",
      `There are ${rates.length} rates for ${concentrations.length} concentrations; one each is needed.`,
    );
  const wrong = concentrations.findIndex((c) => !(Number.isFinite(c) && c >= 0));
  if (wrong >= 0)
    return bad(
      "concentrations",
      `Concentration ${wrong + 1} is ${concentrations[wrong]}; it must be a number of 0 or more.`,
    );
  const odd = rates.findIndex((rate) => !Number.isFinite(rate));
  if (odd >= 0) return bad("rates", `Rate ${odd + 1} is ${rates[odd]}; it must be a finite number.`);
  const levels = new Set(concentrations.filter((c) => c > 0)).size;
  if (levels < 2)
    return {
      status: "too-few-points",
      place: "concentrations",
      message: `There ${levels === 1 ? "is 1 concentration" : "are no concentrations"} above 0; a limiting rate and a half-saturation concentration need at least 2 different ones, and 3 points for an uncertainty.`,
    };
  if (rates.every((rate) => rate === 0))
    return bad("rates", "Every rate is 0, so there is nothing to saturate.");
  return null;
}
