import { concentrationUnitText, molarTo } from "kinetics-core/quantities";
import type { TraceFigureView } from "@/app/_figures/figure-view";
import type { ImportPreview, TracePreview } from "@/app/_import/preview";
import type { SignalUnit, SpeciesContext, StudyContext } from "@/app/_import/reading";
import type { RunMark } from "@/app/_worksheet/analysis";
import { typedNumber } from "@/app/_worksheet/typed-number/print-typed";
import { countInWords } from "@/app/_worksheet/words";

/** The preview in words and plain props. */

export type ReadPreview = Extract<ImportPreview, { status: "read" }>;

export function megabytes(bytes: number): string {
  if (bytes < 1000) return `${bytes}\u202fB`;
  if (bytes < 1_000_000) return `${(bytes / 1000).toFixed(1)}\u202fkB`;
  return `${(bytes / 1_000_000).toFixed(1)}\u202fMB`;
}

/** The finding: "Five traces read, two questions to settle". */
export function headline(reading: ReadPreview): string {
  const traces = reading.traces.length;
  const open = reading.issues.filter((issue) => issue.severity === "blocks").length;
  const weak = reading.issues.filter((issue) => issue.severity === "weakens").length;
  const read = `${countInWords(traces)} ${traces === 1 ? "trace" : "traces"} read`;
  if (open > 0)
    return `${read}, ${countInWords(open).toLowerCase()} ${open === 1 ? "question" : "questions"} to settle`;
  if (weak > 0)
    return `${read}, ${countInWords(weak).toLowerCase()} ${weak === 1 ? "thing" : "things"} to know`;
  return `${read}, nothing to settle`;
}

/** "Store 5 traces" */
export function storeLabel(traces: number): string {
  return `Store ${traces} ${traces === 1 ? "trace" : "traces"}`;
}

/** Label and value of what will be stored, for the margin. */
export function storedFacts(
  traces: readonly TracePreview[],
): readonly { readonly name: string; readonly text: string }[] {
  const readings = traces.map((trace) => trace.readings);
  const total = readings.reduce((sum, count) => sum + count, 0);
  const least = Math.min(...readings);
  const most = Math.max(...readings);
  const from = Math.min(...traces.map((trace) => trace.fromSeconds));
  const to = Math.max(...traces.map((trace) => trace.toSeconds));
  const temperatures = traces.flatMap((trace) => trace.temperatureKelvin ?? []);
  const labels = traces.map((trace) => trace.label);
  return [
    { name: "Traces", text: `${traces.length}, for ${listed(labels)}` },
    {
      name: "Points",
      text: least === most ? `${least} each, ${total} in all` : `${least} to ${most}, ${total} in all`,
    },
    { name: "Time", text: `${typedNumber(from)} to ${typedNumber(to)} s` },
    ...(temperatures.length > 0
      ? [{ name: "Cell", text: `${range(temperatures.map((kelvin) => kelvin - 273.15))} °C` }]
      : []),
  ];
}

function listed(labels: readonly string[]): string {
  if (labels.length > 4) return `${labels[0]} to ${labels.at(-1)}`;
  return labels.length < 2 ? labels.join("") : `${labels.slice(0, -1).join(", ")} and ${labels.at(-1)}`;
}

function range(values: readonly number[]): string {
  const low = Math.min(...values).toFixed(1);
  const high = Math.max(...values).toFixed(1);
  return low === high ? low : `${low} to ${high}`;
}

/** Runs that are not stored yet have no recipe-based mark: neutral, told apart by their labels. */
const NEUTRAL: RunMark = { series: "base", level: 0, levels: 1, repeat: false };

export function traceFigure(
  traces: readonly TracePreview[],
  signal: StudyContext["signal"],
): TraceFigureView {
  const y =
    signal?.kind === "calibrated"
      ? { quantity: signal.quantity, unit: signal.unit === "1" ? "" : signal.unit }
      : { quantity: "concentration", unit: signal === null ? "" : printedUnit(signal.unit) };
  const factor = signal?.kind === "concentration" ? molarTo(1, signal.unit) : 1;
  return {
    x: { quantity: "time", unit: "s" },
    y,
    traces: traces
      .filter((trace) => trace.timeSeconds.length > 0)
      .map((trace) => ({
        label: trace.label,
        mark: NEUTRAL,
        setAside: false,
        x: trace.timeSeconds,
        y: trace.signal.map((value) => value * factor),
      })),
  };
}

/** "[A]₀" by symbol, else the name. */
export function speciesHead(species: SpeciesContext): string {
  return species.symbol === "" ? species.name : `[${species.symbol}]`;
}

function printedUnit(unit: SpeciesContext["unit"]): string {
  return concentrationUnitText(unit).replace(/^umol/, "µmol");
}

/** Plain text for typesetting: "mmol L^-1". */
export function speciesUnit(species: SpeciesContext): string {
  return printedUnit(species.unit);
}

/** The text of a prefilled concentration, in the species' unit. */
export function prefilled(molar: number, species: SpeciesContext): string {
  return typedNumber(molarTo(molar, species.unit));
}

export function signalUnitOptions(
  signal: StudyContext["signal"],
): readonly { readonly value: SignalUnit; readonly label: string }[] {
  if (signal?.kind === "concentration") {
    return (["mol/L", "mmol/L", "umol/L"] as const).map((unit) => ({ value: unit, label: UNIT_NAMES[unit] }));
  }
  const unit = signal === null || signal.unit === "" || signal.unit === "1" ? "" : signal.unit;
  return [
    { value: "as-set-up", label: unit === "" ? "as it stands" : unit },
    { value: "thousandths", label: unit === "" ? "thousandths (mAU)" : `m${unit}` },
  ];
}

/** For menus, which cannot typeset. */
const UNIT_NAMES = { "mol/L": "mol L⁻¹", "mmol/L": "mmol L⁻¹", "umol/L": "µmol L⁻¹" } as const;

/** SHA-256 in groups that a person can compare: "9f3c 71d0 … a86e". */
export function shortHash(sha256: string): string {
  return `${sha256.slice(0, 4)} ${sha256.slice(4, 8)} … ${sha256.slice(-4)}`;
}
