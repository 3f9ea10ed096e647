import type { StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay, rateConstantDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { standingConstant } from "@/app/_worksheet/standing-constant";
import type { Sheet, SheetSpecies } from "@/db/sheet/sheet.schema";

export interface UnitLine {
  readonly of: string;
  /** Plain text, "µmol L^-1"; several species may share one. */
  readonly unit: string;
}

/** "One ester…" as far as a program can say it: what reacts, and what is followed. */
export function setUpTitle(sheet: Sheet): string {
  const reactants = sheet.species.filter((species) => species.stoichiometricNumber < 0);
  const followed = sheet.species.find((species) => species.id === sheet.followedSpeciesId);
  if (reactants.length === 0) return "No reaction yet";
  const names = list(reactants.map(nameOf));
  const reaction = `${names} ${reactants.length === 1 ? "reacts" : "react"}`;
  return sentenceStart(
    followed ? `${reaction}; ${nameOf(followed)} is followed` : `${reaction}; nothing is followed yet`,
  );
}

/** Units in which the study's pages print. */
export function unitLines(sheet: Sheet, { law }: StudyAnalysis): UnitLine[] {
  const shown = sheet.species.filter(
    (species) => species.symbol !== "" && (species.inLaw || species.id === sheet.followedSpeciesId),
  );
  const units = [...new Set(shown.map(({ unit }) => unit))];
  const lines = units.map((unit) => ({
    of: shown.flatMap((species) => (species.unit === unit ? [species.symbol] : [])).join(", "),
    unit: concentrationDisplay(unit).unit,
  }));
  const constant = law.status === "law" ? standingConstant(sheet, law.fit) : null;
  return [
    ...lines,
    { of: "Time", unit: sheet.study.timeUnit },
    { of: "Rate", unit: rateDisplay(sheet).unit },
    ...(constant?.kind === "rate-constant"
      ? [{ of: "*k*", unit: rateConstantDisplay(sheet, constant.overallOrder).unit }]
      : []),
  ];
}

function nameOf(species: SheetSpecies): string {
  return species.name || species.formula || species.symbol;
}

function list(words: readonly string[]): string {
  return words.length < 2 ? words.join("") : `${words.slice(0, -1).join(", ")} and ${words.at(-1)}`;
}

function sentenceStart(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
