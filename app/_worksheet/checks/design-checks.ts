import type { Check } from "../analysis";
import { lawName } from "../law-name";
import { lawSpecies } from "../present-runs";
import { distinctLevels } from "../run-marks";
import { studyCheck } from "./check";
import type { Checked } from "./find-checks";

/** Two levels give an order but cannot show whether one order holds between them. Common practice. */
const FEWEST_LEVELS = 3;

/**
 * Levels and span behind each free order. That orders cannot be told apart, or hardly, is the library's finding and
 * comes with its flags.
 */
export function designChecks({ sheet, carrying, law }: Checked): readonly Check[] {
  const { fit } = law;
  if (fit === null) return [];
  const runs = carrying.map(({ run }) => run);
  return lawSpecies(sheet).flatMap((species): readonly Check[] => {
    const name = lawName(species);
    const levels = distinctLevels(runs, species.id);
    const least = levels[0] ?? 0;
    const most = levels.at(-1) ?? 0;
    const separated = fit.separability.find((one) => one.species === name)?.severity === "holds";
    const held = (sheet.orders[species.id] ?? null) !== null;
    if (held || !separated || levels.length < 2 || least <= 0) return [];
    const factor = Number((most / least).toPrecision(2));
    const words = `The order in ${name} rests on ${counted(levels.length)} levels over a factor of ${factor}.`;
    return levels.length < FEWEST_LEVELS
      ? [
          studyCheck(
            "rate-law",
            "weakens",
            "few-levels",
            `${words} Two cannot show whether one order holds between them: a third level would.`,
          ),
        ]
      : [studyCheck("rate-law", "holds", "levels", words)];
  });
}

const NUMBERS = ["no", "one", "two", "three", "four", "five", "six", "seven", "eight", "nine", "ten"];

function counted(count: number): string {
  return NUMBERS[count] ?? String(count);
}
