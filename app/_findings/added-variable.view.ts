import type { AddedVariable, RateLawFit } from "kinetics-core/rate-law";
import type { AddedVariableView } from "@/app/_figures/figure-view";
import type { StudyAnalysis } from "@/app/_worksheet/analysis";
import { concentrationDisplay, rateDisplay } from "@/app/_worksheet/display-units";
import { lawName } from "@/app/_worksheet/law-name";
import { list } from "@/app/_worksheet/missing-law";
import { lawSpecies, presentRuns } from "@/app/_worksheet/present-runs";
import { printSimpleOrder } from "@/app/_worksheet/print-order";
import { runMarks, variedSpecies } from "@/app/_worksheet/run-marks";
import type { Sheet, SheetSpecies } from "@/db/sheet/sheet.schema";
import { orderInWords } from "./order-words";

/** Rate against one concentration with the effect of the others removed, one figure per species of the law. */
export interface AddedVariableFigureView {
  readonly speciesId: string;
  readonly figure: AddedVariableView;
  readonly caption: string;
  readonly label: string;
}

export function addedVariableViews(
  sheet: Sheet,
  analysis: StudyAnalysis,
  fit: RateLawFit,
): readonly AddedVariableFigureView[] {
  const species = lawSpecies(sheet);
  // The species varied first is drawn first, as on the run sheet.
  const varied = variedSpecies(sheet);
  const rank = (one: SheetSpecies) => (varied.includes(one.id) ? varied.indexOf(one.id) : varied.length);
  return [...species]
    .sort((a, b) => rank(a) - rank(b))
    .flatMap((one) => {
      const added = fit.addedVariables.find((variable) => variable.species === lawName(one));
      return added === undefined || added.points.length === 0
        ? []
        : [viewOf(sheet, analysis, fit, one, added)];
    });
}

function viewOf(
  sheet: Sheet,
  analysis: StudyAnalysis,
  fit: RateLawFit,
  species: SheetSpecies,
  added: AddedVariable,
): AddedVariableFigureView {
  const name = lawName(species);
  const concentration = concentrationDisplay(species.unit);
  const rate = rateDisplay(sheet);
  const others = lawSpecies(sheet).filter((one) => one.id !== species.id);
  const held = heldRuns(sheet, species);
  const points = added.points.map((point) => {
    const run = analysis.runs.find((one) => one.label === point.label);
    return {
      label: point.label,
      mark: run?.mark ?? { series: "base" as const, level: 0, levels: 1, repeat: false },
      setAside: false,
      x: point.concentration * concentration.factor,
      y: point.rateAtCentre * rate.factor,
      held: held.has(point.label),
    };
  });
  const estimate = fit.orders[name] ?? null;
  const slope = estimate?.estimate ?? null;
  const through = {
    x: (fit.centre.concentrations[name] ?? 0) * concentration.factor,
    y: (fit.centre.rate.estimate ?? 0) * rate.factor,
  };
  const drawable = slope !== null && through.x > 0 && through.y > 0;
  const order = orderInWords(fit, name, 2);
  return {
    speciesId: species.id,
    figure: {
      x: { quantity: `[${name}]`, unit: concentration.unit },
      y: { quantity: quantityOf(others), unit: rate.unit },
      points,
      line: drawable ? { slope, through } : null,
      band: drawable
        ? bandOf(
            fit,
            name,
            points.map((point) => point.x / concentration.factor),
          ).map((at) => ({
            x: at.x * concentration.factor,
            low: at.low * rate.factor,
            high: at.high * rate.factor,
          }))
        : [],
      guides: slope === null ? [] : guidesAbout(slope),
      note: `order in ${name}: ${order}`,
    },
    caption: captionOf(
      species,
      heldAt(fit, others),
      points.some((point) => point.held),
    ),
    label: `Rate against [${name}], order ${order}`,
  };
}

/** Labels of runs that belong to another species' series and hold this one at the level of the base recipe. */
function heldRuns(sheet: Sheet, species: SheetSpecies): ReadonlySet<string> {
  const runs = presentRuns(sheet);
  const marks = runMarks(sheet);
  const base = runs.find((run) => marks.get(run.id)?.series === "base");
  const level = base?.concentrations[species.id]?.molar;
  if (level === undefined) return new Set();
  const same = runs.filter((run) => {
    const molar = run.concentrations[species.id]?.molar ?? 0;
    return Math.abs(molar - level) <= 0.005 * level;
  });
  // Two marks at one place are told apart by their names; a crowd is bracketed.
  return new Set(same.length > 2 ? same.map((run) => run.label) : []);
}

function quantityOf(others: readonly SheetSpecies[]): string {
  const [only, second] = others;
  if (only === undefined) return "rate";
  return second === undefined ? `rate, [${lawName(only)}] at the centre` : "rate, others at the centre";
}

/** "[B] = 5.13 mmol L^-1": where the other species are held in the figure, each with its unit. */
function heldAt(fit: RateLawFit, others: readonly SheetSpecies[]): readonly string[] {
  return others.flatMap((one) => {
    const molar = fit.centre.concentrations[lawName(one)];
    if (molar === undefined) return [];
    const { factor, unit } = concentrationDisplay(one.unit);
    return [`[${lawName(one)}] = ${Number((molar * factor).toPrecision(3))} ${unit}`];
  });
}

/** Confidence band of ln v along one concentration, the others at the centre: gᵀ C g with g = (1, ln c). */
function bandOf(fit: RateLawFit, name: string, concentrations: readonly number[]) {
  const names = Object.keys(fit.orders);
  const factor = studentFactor(fit);
  const log = fit.logRateConstant.estimate;
  const { covariance } = fit;
  if (factor === null || log === null || covariance === null || concentrations.length === 0) return [];
  const low = Math.log(Math.min(...concentrations)) - BAND_OVERHANG;
  const high = Math.log(Math.max(...concentrations)) + BAND_OVERHANG;
  return Array.from({ length: BAND_POINTS + 1 }, (_, index) => {
    const at = low + ((high - low) * index) / BAND_POINTS;
    const row = [
      1,
      ...names.map((one) => (one === name ? at : Math.log(fit.centre.concentrations[one] ?? 1))),
    ];
    const value = names.reduce(
      (sum, one, i) => sum + (fit.orders[one]?.estimate ?? 0) * (row[i + 1] ?? 0),
      log,
    );
    const variance = row.reduce(
      (sum, a, i) => sum + row.reduce((inner, b, j) => inner + a * b * (covariance[i]?.[j] ?? 0), 0),
      0,
    );
    const half = factor * Math.sqrt(Math.max(0, variance));
    return { x: Math.exp(at), low: Math.exp(value - half), high: Math.exp(value + half) };
  });
}

const BAND_POINTS = 32;
/** The band reaches this far beyond the outermost runs, on the logarithmic scale. */
const BAND_OVERHANG = 0.15;

/** Half-width over standard error, from the fit's own interval of ln k. */
function studentFactor({ logRateConstant: { interval, standardError } }: RateLawFit): number | null {
  return interval === null || standardError === null || standardError === 0
    ? null
    : (interval[1] - interval[0]) / 2 / standardError;
}

/** Simple orders that are worth a guide line beside the fitted one. */
const GUIDES = [-1, 0, 0.5, 1, 2, 3] as const;

function guidesAbout(slope: number) {
  const nearest = GUIDES.reduce((best, order) =>
    Math.abs(order - slope) < Math.abs(best - slope) ? order : best,
  );
  const at = GUIDES.indexOf(nearest);
  return [GUIDES[at - 1], GUIDES[at + 1]].flatMap((order) =>
    order === undefined ? [] : [{ label: `order ${printSimpleOrder(order) ?? order}`, slope: order }],
  );
}

function captionOf(species: SheetSpecies, held: readonly string[], bracketed: boolean): string {
  const removed = held.length === 0 ? "" : `, rates brought to ${list(held)}`;
  const bracket = bracketed ? ` Bracketed marks share one [${lawName(species)}].` : "";
  const name = species.name || lawName(species);
  return `${name.charAt(0).toUpperCase()}${name.slice(1)}${removed}. Band: 95 %.${bracket}`;
}
