import type { RunMapView, TraceFigureView } from "@/app/_figures/figure-view";
import type { StudyAnalysis } from "@/app/_worksheet/analysis";
import { signalPerMolar } from "@/app/_worksheet/assemble";
import { concentrationDisplay, timeDisplay } from "@/app/_worksheet/display-units";
import { followedSpecies, lawSpecies, presentRuns } from "@/app/_worksheet/present-runs";
import { variedSpecies } from "@/app/_worksheet/run-marks";
import type { Sheet, SheetRun } from "@/db/sheet/sheet.schema";

/** A trace on its own clock, as it is stored or thinned for drawing. */
export interface DrawableTrace {
  readonly timeSeconds: readonly number[];
  readonly signal: readonly number[];
}

type Traces = ReadonlyMap<string, DrawableTrace>;

/** Time after mixing and concentration of the followed species (or the signal itself), in the study's units. */
export function shownTrace(sheet: Sheet, run: SheetRun, trace: DrawableTrace): { x: number[]; y: number[] } {
  const time = timeDisplay(sheet).factor;
  const height = shownSignal(sheet).factor;
  return {
    x: trace.timeSeconds.map((seconds) => (seconds - run.timeZeroSeconds) * time),
    y: trace.signal.map((signal) => signal * height),
  };
}

/** The axis that traces share, and what turns a stored signal into it. */
function shownSignal(sheet: Sheet): { quantity: string; unit: string; factor: number } {
  const followed = followedSpecies(sheet);
  const perMolar = sheet.signal === null ? 0 : signalPerMolar(sheet.signal).value;
  if (followed === null || perMolar === 0) {
    const quantity = sheet.signal?.kind === "calibrated" ? sheet.signal.quantity : "Signal";
    return { quantity, unit: sheet.signal?.kind === "calibrated" ? sheet.signal.unit : "", factor: 1 };
  }
  const display = concentrationDisplay(followed.unit);
  return {
    quantity: `[${followed.name || followed.symbol}]`,
    unit: display.unit,
    factor: display.factor / perMolar,
  };
}

export function traceFigureView(sheet: Sheet, analysis: StudyAnalysis, traces: Traces): TraceFigureView {
  const { quantity, unit } = shownSignal(sheet);
  const runs = new Map(presentRuns(sheet).map((run) => [run.id, run]));
  return {
    x: { quantity: "time", unit: timeDisplay(sheet).unit },
    y: { quantity, unit },
    traces: analysis.runs.flatMap((analysed) => {
      const run = runs.get(analysed.runId);
      const trace = run?.trace ? traces.get(run.trace.sha256) : undefined;
      if (!run || !trace) return [];
      return [
        {
          label: analysed.label,
          mark: analysed.mark,
          setAside: analysed.state === "set-aside",
          ...shownTrace(sheet, run, trace),
        },
      ];
    }),
  };
}

/** The plane of the two species that are varied first; null where fewer than two stand in the law. */
export function runMapView(sheet: Sheet, analysis: StudyAnalysis): RunMapView | null {
  const species = lawSpecies(sheet);
  const order = [...variedSpecies(sheet), ...species.map(({ id }) => id)];
  const [across, up] = [...new Set(order)].flatMap((id) => species.find((one) => one.id === id) ?? []);
  if (!across || !up) return null;
  const runs = new Map(presentRuns(sheet).map((run) => [run.id, run]));
  const acrossDisplay = concentrationDisplay(across.unit);
  const upDisplay = concentrationDisplay(up.unit);
  const points = analysis.runs.flatMap((analysed) => {
    const run = runs.get(analysed.runId);
    const x = run?.concentrations[across.id]?.molar;
    const y = run?.concentrations[up.id]?.molar;
    if (x === undefined || y === undefined) return [];
    return [
      {
        label: analysed.label,
        mark: analysed.mark,
        setAside: analysed.state === "set-aside",
        x: x * acrossDisplay.factor,
        y: y * upDisplay.factor,
      },
    ];
  });
  if (points.length === 0) return null;
  return {
    x: { quantity: `[${across.symbol}]`, unit: acrossDisplay.unit },
    y: { quantity: `[${up.symbol}]`, unit: upDisplay.unit },
    points,
    next: null,
  };
}

/** One line of medium, cell and sampling, for the margin. */
export function recipeLines(sheet: Sheet, traces: Traces): { name: string; value: string }[] {
  const { solvent, electrolyte, pathLengthCentimetre, wavelengthNanometre } = sheet.conditions;
  const cell = [
    pathLengthCentimetre === null ? "" : `${pathLengthCentimetre.value.toFixed(3)} cm`,
    wavelengthNanometre === null ? "" : `${wavelengthNanometre} nm`,
  ];
  const lines = [
    { name: "Medium", value: joined([electrolyte, solvent]) },
    { name: "Cell", value: joined(cell) },
    { name: "Interval", value: intervalOf(sheet, traces) },
  ];
  return lines.filter(({ value }) => value !== "");
}

function joined(parts: readonly string[]): string {
  return parts.filter((part) => part !== "").join(", ");
}

/** Mean step between readings, where it is the same in all traces. */
function intervalOf(sheet: Sheet, traces: Traces): string {
  const steps = presentRuns(sheet).flatMap(({ trace }) => {
    const times = trace === null ? undefined : traces.get(trace.sha256)?.timeSeconds;
    const [first] = times ?? [];
    const last = times?.at(-1);
    if (trace === null || trace.points < 2 || first === undefined || last === undefined) return [];
    return [(last - first) / (trace.points - 1)];
  });
  const [step] = steps;
  const same = step !== undefined && steps.every((other) => Math.abs(other - step) < 0.01 * step);
  return same ? `${Number(step.toPrecision(3))} s` : "";
}
