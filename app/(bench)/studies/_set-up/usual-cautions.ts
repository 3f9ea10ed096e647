import type { SetUpForm, SpeciesForm } from "./set-up-form.schema";

/** A caution as it stands in the margin: whom it concerns and what to mind. */
export interface Caution {
  readonly concerns: string;
  readonly text: string;
}

interface CautionRule {
  readonly matches: RegExp;
  readonly text: string;
}

/**
 * The usual cautions for classes of reagents that the reaction itself gives away. They stand beside what people
 * write themselves and replace neither the safety data sheet nor local rules.
 */
const RULES: readonly CautionRule[] = [
  {
    matches: /^(?:OH-|HO-|NaOH|KOH|LiOH|hydroxide|sodium hydroxide|potassium hydroxide)$/i,
    text: "Strong alkali, corrosive; the stock above all. Eye protection; never pipette by mouth.",
  },
  {
    matches:
      /^(?:ClO-|OCl-|HOCl|HClO|NaOCl|NaClO|Ca\(OCl\)2|Ca\(ClO\)2|Cl2|ClO2|NH2Cl|NHCl2|NCl3)$|hypochlor|chlorine|chloramine|\bbleach\b/i,
    text: "Releases chlorine. Never mix with acids or ammonia; work in a fume cupboard.",
  },
  {
    matches:
      /^(?:H2O2|HO2-|MnO4-|KMnO4|Cr2O7\^2-|CrO4\^2-|S2O8\^2-|HSO5-|ClO3-|BrO3-|IO3-|IO4-|Ce\^4\+|HNO3)$|peroxide|peroxodi|permanganate|dichromate|persulfate/i,
    text: "Oxidiser. Keep away from organic solvents and reducing agents, in stocks and in waste.",
  },
  {
    matches: /^(?:Cr2O7\^2-|CrO4\^2-)$|dichromate|chromate/i,
    text: "Chromium(VI): toxic, carcinogenic. Collect all waste.",
  },
  {
    matches: /^(?:CN-|HCN|KCN|NaCN)$|^cyanide$/i,
    text: "Very toxic. Never acidify: hydrogen cyanide is set free.",
  },
  { matches: /^(?:Br2|I2)$|^(?:di)?bromine$/i, text: "Toxic vapour. Work in a fume cupboard." },
  {
    matches: /^(?:H2SO4|HCl|HClO4|HNO3)$|sulfuric|hydrochloric|perchloric|nitric acid/i,
    text: "Strong acid, corrosive. Add acid to water.",
  },
];

export function usualCautions(
  species: readonly Pick<SpeciesForm, "symbol" | "name" | "formula">[],
): Caution[] {
  return species.flatMap((row) => {
    const texts = RULES.filter(({ matches }) => matches.test(row.formula) || matches.test(row.name)).map(
      ({ text }) => text,
    );
    if (texts.length === 0) return [];
    const name = row.name.trim() || row.formula || row.symbol;
    const symbol = row.symbol.trim();
    const concerns = sentenceStart(
      symbol !== "" && symbol !== name && symbol !== row.formula ? `${name}, ${symbol}` : name,
    );
    return [{ concerns, text: texts.join(" ") }];
  });
}

/** All cautions of a study. What people wrote about a reagent stands in place of the usual caution for it. */
export function cautionsOf(form: Pick<SetUpForm, "species" | "hazards">): Caution[] {
  const written = writtenCautions(form.hazards);
  const spoken = written.map(({ concerns }) => concerns.toLowerCase());
  const unspoken = form.species.filter((row) => {
    const name = row.name.trim().toLowerCase();
    const symbol = row.symbol.trim().toLowerCase();
    return !spoken.some(
      (concerns) =>
        (name !== "" && concerns.includes(name)) || (symbol !== "" && concerns.endsWith(`, ${symbol}`)),
    );
  });
  return [...usualCautions(unspoken), ...written];
}

/** The margin ends with this sentence by itself; written again it would stand there twice. */
const STANDING_SENTENCE = /^read the safety data sheet/i;

/** What people wrote: a line each, whom it concerns before the first colon. */
export function writtenCautions(hazards: string): Caution[] {
  return hazards
    .split("\n")
    .map((line) => line.trim())
    .filter((line) => line !== "" && !STANDING_SENTENCE.test(line))
    .map((line) => {
      const colon = line.indexOf(":");
      return colon > 0 && colon < 60
        ? { concerns: line.slice(0, colon).trim(), text: sentenceStart(line.slice(colon + 1).trim()) }
        : { concerns: "", text: line };
    });
}

function sentenceStart(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1);
}
