import type { RunMark } from "@/app/_worksheet/analysis";

/**
 * What figures are drawn from: plain numbers in the units that are shown. View files make it; the drawing, the
 * interactive plot, print and downloads all read the same.
 */

/** `quantity` is prose ("[4-nitrophenolate]", "*v*"), `unit` plain text ("umol" is the caller's to print as µmol). */
export interface AxisView {
  readonly quantity: string;
  readonly unit: string;
}

export interface MarkedRun {
  readonly label: string;
  readonly mark: RunMark;
  readonly setAside: boolean;
}

/** `x` strictly increasing, same length as `y`. */
export interface TraceView extends MarkedRun {
  readonly x: readonly number[];
  readonly y: readonly number[];
}

export interface TraceFigureView {
  readonly x: AxisView;
  readonly y: AxisView;
  readonly traces: readonly TraceView[];
}

export interface MarkedPoint extends MarkedRun {
  readonly x: number;
  readonly y: number;
}

/** Where the runs lie: starting concentrations, logarithmic where all are positive. */
export interface RunMapView {
  readonly x: AxisView;
  readonly y: AxisView;
  readonly points: readonly MarkedPoint[];
  /** The suggested next run, highlighted. */
  readonly next: { readonly label: string; readonly x: number; readonly y: number } | null;
}

/** Rate against one concentration with the effect of the others removed; both axes logarithmic, all values > 0. */
export interface AddedVariableView {
  readonly x: AxisView;
  readonly y: AxisView;
  /** `held`: a run of another series, whose concentration here is the centre's; drawn in brackets, not named. */
  readonly points: readonly (MarkedPoint & { readonly held: boolean })[];
  /** Fitted power law through `through`; null where the order is undetermined. */
  readonly line: {
    readonly slope: number;
    readonly through: { readonly x: number; readonly y: number };
  } | null;
  /** Confidence band of the line, x increasing. */
  readonly band: readonly { readonly x: number; readonly low: number; readonly high: number }[];
  /** Neighbouring simple orders, drawn through the same centre: {label: "order ½", slope: 0.5}. */
  readonly guides: readonly { readonly label: string; readonly slope: number }[];
  /** In the plot, prose: "order in B: 1.004 ± 0.034". */
  readonly note: string;
}

/** Residuals run by run, in the order given. */
export interface ResidualView {
  readonly y: AxisView;
  readonly points: readonly (MarkedRun & { readonly residual: number })[];
}

/** How an answer depends on a choice: a line with its band and the chosen place highlighted. */
export interface DependenceView {
  readonly x: AxisView;
  readonly y: AxisView;
  readonly points: readonly {
    readonly x: number;
    readonly y: number;
    readonly low: number;
    readonly high: number;
  }[];
  readonly chosen: { readonly x: number; readonly y: number } | null;
}

/** One trace with its window, in the trace's own clock. `x` strictly increasing. */
export interface WindowFigureView {
  readonly run: MarkedRun;
  readonly x: AxisView;
  readonly y: AxisView;
  readonly time: readonly number[];
  readonly signal: readonly number[];
  /** Time of mixing. */
  readonly timeZero: number;
  /** Indices of readings that are drawn and not fitted, since they lie in the dead time or outside `counts`. */
  readonly outside: readonly number[];
  /** Indices of readings that are marked as spikes. */
  readonly spikes: readonly number[];
  /** Part of the trace that counts. */
  readonly counts: readonly [number, number];
  /** First and last time used. */
  readonly window: readonly [number, number];
  /** Fitted curve over the window. */
  readonly curve: { readonly x: readonly number[]; readonly y: readonly number[] } | null;
  /** Tangent at the time of mixing: signal there and slope, in the shown units. */
  readonly slope: { readonly x: number; readonly y: number; readonly slope: number } | null;
  /** Signal minus curve for points inside the window. */
  readonly residuals: { readonly x: readonly number[]; readonly y: readonly number[] } | null;
  /** In the plot, prose: "*r*_0 = 1.182 ± 0.018 µmol L^-1 s^-1"; "" for none. */
  readonly note: string;
  /** Under the note: "slope at *t* = 0, standard uncertainty". */
  readonly noteDetail: string;
  /** Fewest points a window may hold. */
  readonly leastPoints: number;
}

/** Bounds as times of two readings, with their indices and the number of readings between them, both included. */
export interface WindowChoice {
  readonly from: number;
  readonly to: number;
  readonly fromIndex: number;
  readonly toIndex: number;
  readonly points: number;
}

/** A calibration line with its standards, in the shown units. */
export interface CalibrationFigureView {
  readonly x: AxisView;
  readonly y: AxisView;
  /** One for each reading. */
  readonly points: readonly {
    readonly x: number;
    readonly y: number;
    readonly standard: string;
    readonly isUsed: boolean;
  }[];
  /** The line and the band that holds one new reading, x increasing; null where there is no line. */
  readonly line: {
    readonly x: readonly number[];
    readonly y: readonly number[];
    readonly low: readonly number[];
    readonly high: readonly number[];
  } | null;
  /** Part of the concentrations that the line is drawn through, with what stands over it: "in use, 5.00 to 55.0". */
  readonly range: { readonly from: number; readonly to: number; readonly words: string } | null;
  /** In the plot, prose: "*A* = 0.012 + 0.01793 *c*"; "" for none. */
  readonly note: string;
}

/** Residuals against a quantity, both axes linear. */
export interface PlacedResidualsView {
  readonly x: AxisView;
  readonly y: AxisView;
  readonly points: readonly { readonly x: number; readonly residual: number; readonly name: string }[];
  /** The axis reaches at least here, to lie under another figure's. */
  readonly xReach: number;
}
