import { type Estimate, printUncertain } from "kinetics-core/quantities";
import type { RateLawFit } from "kinetics-core/rate-law";
import type { ConstantView, FactView, LawView, PrintedNumber, StandingLawView } from "@/app/_ui/law-view";
import type { Sheet } from "@/db/sheet/sheet.schema";
import type { Check, StudyAnalysis } from "./analysis";
import { gatherNotes } from "./checks/gather-notes";
import { concentrationDisplay, type DisplayScale, rateConstantDisplay, rateDisplay } from "./display-units";
import { lawName } from "./law-name";
import { list } from "./missing-law";
import { lawSpecies } from "./present-runs";
import { printExponent } from "./print-order";
import { standingConstant, standingOrders } from "./standing-constant";
import type { Station } from "./station";

/**
 * The strip at the head of every station, from the analysis alone. `hrefOf` says where a station is to be found:
 * a page for members, a place on the same page for a reader of a shared link.
 */
export function standingLawView(
  sheet: Sheet,
  analysis: StudyAnalysis,
  hrefOf: (station: Station) => string,
): StandingLawView {
  const { law } = analysis;
  const facts = factsOf(sheet, analysis, hrefOf);
  if (law.status === "no-law")
    return {
      changeKey: `no law ${law.missing}`,
      law: { status: "no-law", missing: law.missing },
      conditions: conditionsOf(sheet, null),
      facts,
      announcement: `No law yet. ${law.missing}`,
    };
  const expression = lawExpression(sheet, law.fit);
  const constant = constantView(sheet, law.fit, 1);
  const spoken = spokenLaw(expression, constant);
  return {
    changeKey: spoken,
    law: { status: "law", expression, constant },
    conditions: conditionsOf(sheet, law.fit),
    facts,
    announcement: `Standing law: ${spoken}.`,
  };
}

/** "rate = k [A]¹[B]¹". */
export function lawExpression(sheet: Sheet, fit: RateLawFit): LawView {
  return {
    constant: "*k*",
    factors: standingOrders(sheet, fit).map(({ name, heldAt }) => ({
      symbol: name,
      order: printExponent(fit, name, heldAt),
    })),
  };
}

/** k, or with free orders the rate at the centre of the design; half the interval's width as its uncertainty. */
export function constantView(sheet: Sheet, fit: RateLawFit, digits: 1 | 2): ConstantView {
  const constant = standingConstant(sheet, fit);
  const display =
    constant.kind === "rate-constant"
      ? rateConstantDisplay(sheet, constant.overallOrder)
      : rateDisplay(sheet);
  return {
    symbol: constant.kind === "rate-constant" ? "*k*" : "*v*_c",
    number: printEstimate(constant.estimate, display, digits),
    unit: display.unit,
  };
}

/** An estimate with half the width of its interval behind the ±; alone where no interval can be given. */
export function printEstimate(estimate: Estimate, display: DisplayScale, digits: 1 | 2): PrintedNumber {
  if (estimate.estimate === null) return { value: "\u2003", uncertainty: null, power: 0 };
  const half = estimate.interval === null ? null : (estimate.interval[1] - estimate.interval[0]) / 2;
  return printUncertain(estimate.estimate * display.factor, half === null ? null : half * display.factor, {
    digits,
  });
}

/** Plain words of the law and its constant, for titles, announcements and toasts. */
export function spokenLaw(law: LawView, constant: ConstantView): string {
  const factors = law.factors.map(
    (one) => `[${one.symbol}]${one.order === "" ? "" : ` to the ${one.order}`}`,
  );
  return `rate = k ${factors.join(" ")}, ${constant.symbol.replaceAll("*", "")} = ${plainNumber(constant)}`;
}

/** "11.8 ± 0.3 L mol^-1 s^-1" in one line of plain text. */
export function plainNumber({ number, unit }: { number: PrintedNumber; unit: string }): string {
  const pair = number.uncertainty === null ? number.value : `${number.value} ± ${number.uncertainty}`;
  const bracketed = number.uncertainty === null ? pair : `(${pair})`;
  const raised = number.power === 0 ? pair : `${bracketed} × 10^${number.power}`;
  return `${raised} ${unit}`.trim();
}

function conditionsOf(sheet: Sheet, fit: RateLawFit | null): string {
  const { temperatureKelvin, ionicStrengthMolar, solvent } = sheet.conditions;
  const conditions: string[] = [];
  if (fit !== null) conditions.push(intervalInWords(sheet, fit));
  if (temperatureKelvin !== null) conditions.push(`${celsius(temperatureKelvin.value)} °C`);
  if (ionicStrengthMolar !== null)
    conditions.push(`*I* = ${printUncertain(ionicStrengthMolar.value, null).value} mol L^-1`);
  if (solvent !== "") conditions.push(solvent);
  const names = lawSpecies(sheet)
    .filter((species) => species.symbol !== "" && species.name !== "" && species.symbol !== species.name)
    .map((species) => `${lawName(species)} is ${species.name}`);
  const centre =
    fit !== null && standingConstant(sheet, fit).kind === "rate-at-centre" ? centreInWords(sheet, fit) : "";
  return [conditions.join(", "), names.join(", "), centre]
    .filter((part) => part !== "")
    .map(asSentence)
    .join(" ");
}

/** A back-transformed interval is lopsided; where that shows, its ends are named. */
function intervalInWords(sheet: Sheet, fit: RateLawFit): string {
  const constant = standingConstant(sheet, fit);
  const { estimate, interval, level } = constant.estimate;
  if (estimate === null || interval === null) return "no interval can be given";
  const name = `${Math.round(level * 100)} % confidence interval`;
  const [low, high] = interval;
  if (high - estimate <= LOPSIDED * (estimate - low)) return name;
  const display =
    constant.kind === "rate-constant"
      ? rateConstantDisplay(sheet, constant.overallOrder)
      : rateDisplay(sheet);
  const half = ((high - low) / 2) * display.factor;
  const ends = [low, high].map((end) => printUncertain(end * display.factor, half, { power: 0 }).value);
  return `${name} ${ends.join(" to ")}`;
}

/** Upper arm over lower arm from which ± alone would mislead. */
const LOPSIDED = 1.2;

function centreInWords(sheet: Sheet, fit: RateLawFit): string {
  const at = lawSpecies(sheet).flatMap((species) => {
    const molar = fit.centre.concentrations[lawName(species)];
    if (molar === undefined) return [];
    const display = concentrationDisplay(species.unit);
    return [`[${lawName(species)}] = ${Number((molar * display.factor).toPrecision(3))} ${display.unit}`];
  });
  return `*v*_c is the rate at the centre of the runs, ${list(at)}`;
}

function celsius(kelvin: number): string {
  return (kelvin - 273.15).toFixed(1).replace("-", "\u2212");
}

function asSentence(text: string): string {
  const first = text.charAt(0);
  const start = /^[A-Z*[]|^\d/.test(text) ? text : first.toUpperCase() + text.slice(1);
  return `${start}.`;
}

function factsOf(
  sheet: Sheet,
  analysis: StudyAnalysis,
  hrefOf: (station: Station) => string,
): readonly FactView[] {
  const standing = analysis.runs.filter((run) => run.state === "standing").length;
  const aside = analysis.runs.filter((run) => run.state === "set-aside").length;
  return [
    {
      label: "Evidence",
      headline: standing === 1 ? "1 run" : `${standing} runs`,
      detail: aside === 0 ? "none set aside" : `${aside} set aside`,
      href: hrefOf("runs"),
    },
    {
      label: "Nearest rival",
      headline: "Not compared",
      detail: "one law fitted so far",
      href: hrefOf("rate-law"),
    },
    { label: "Weakest link", ...weakestLink(sheet, analysis), href: hrefOf("rate-law") },
    {
      label: "Checks",
      ...checksInWords(gatherNotes(analysis.checks, analysis.runs)),
      href: hrefOf(stationOfWorst(analysis.checks)),
    },
  ];
}

function weakestLink(sheet: Sheet, { law }: StudyAnalysis): { headline: string; detail: string } {
  if (law.status === "no-law") return { headline: "No law", detail: "nothing to weaken" };
  const { fit } = law;
  let widest: { name: string; half: number } | null = null;
  for (const { name, heldAt } of standingOrders(sheet, fit)) {
    const interval = fit.orders[name]?.interval ?? null;
    if (heldAt !== null || interval === null) continue;
    const half = (interval[1] - interval[0]) / 2;
    if (widest === null || half > widest.half) widest = { name, half };
  }
  if (widest !== null)
    return {
      headline: `Order in ${widest.name}`,
      detail: `±${printUncertain(widest.half, widest.half, { digits: 1 }).value}`,
    };
  const constant = standingConstant(sheet, fit);
  const largest = [...constant.budget].sort((a, b) => b.relative - a.relative)[0];
  const total = constant.budget.reduce((sum, one) => sum + one.relative ** 2, 0);
  if (constant.estimate.interval === null || largest === undefined || total === 0)
    return { headline: "No interval", detail: `${fit.degreesOfFreedom} degrees of freedom` };
  return {
    headline: largest.source,
    detail: `${Math.round((100 * largest.relative ** 2) / total)} % of *u*^2`,
  };
}

/** "1 weakens" over "5 notes, none blocks"; settled checks do not count. */
function checksInWords(checks: readonly Check[]): { headline: string; detail: string } {
  const open = checks.filter((check) => check.settled === null);
  const count = (severity: Check["severity"]) => open.filter((check) => check.severity === severity).length;
  const blocks = count("blocks");
  const weakens = count("weakens");
  const notes = count("note");
  const noted = notes === 1 ? "1 note" : `${notes === 0 ? "no" : notes} notes`;
  const weakening = weakens === 1 ? "1 weakens" : `${weakens === 0 ? "none" : weakens} weaken`;
  if (blocks > 0)
    return { headline: blocks === 1 ? "1 blocks" : `${blocks} block`, detail: `${weakening}, ${noted}` };
  return { headline: weakens === 0 ? "None weakens" : weakening, detail: `${noted}, none blocks` };
}

function stationOfWorst(checks: readonly Check[]): Station {
  return checks.find((check) => check.settled === null && check.severity !== "holds")?.station ?? "rate-law";
}
