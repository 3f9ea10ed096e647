import type { Flag } from "kinetics-core/quantities";
import type { FittedLaw } from "./fitted-law";
import { factors, type LogPrediction, logPrediction } from "./log-prediction";
import { rangeFlags } from "./prediction-flags";
import {
  type Course,
  type CourseFault,
  courseOf,
  type Mixture,
  rateFactorAt,
  timeIntegrals,
} from "./reaction-course";

export interface CourseBand {
  readonly status: "predicted";
  readonly points: readonly CourseBandPoint[];
  readonly flags: readonly Flag[];
}

type Interval = readonly [number, number];

/** A concentration or an extent, in the unit of the law, with the law's interval and that of one new run. */
export interface Banded {
  readonly value: number;
  readonly ofTheLaw: Interval | null;
  readonly newRun: Interval | null;
}

export interface CourseBandPoint {
  readonly time: number;
  /** ξ, from 0 to its end. */
  readonly extent: Banded;
  readonly concentrations: Readonly<Record<string, Banded>>;
}

/**
 * Concentrations against time with a band. Where a reactant runs out the band is made sideways: at an extent ξ the time
 * has the interval t(ξ) e^(±q s(ξ)) of `timeToConversion`, and the extents whose time interval contains t are the band
 * at t. It never leaves 0 to ξ_end. Towards an equilibrium t(ξ) grows without bound and says nothing, so there the
 * extent itself gets its interval: ∂ξ/∂ln k = f·k t, ∂ξ/∂θ = −f·∂(k t)/∂θ, cut at 0.
 * `times`: 0 or above, in the time unit of the law.
 */
export function courseBand(
  law: FittedLaw,
  mixture: Mixture,
  times: readonly number[],
): CourseBand | CourseFault {
  const wrong = times.findIndex((time) => !(time >= 0) || !Number.isFinite(time));
  if (wrong >= 0)
    return {
      status: "bad-mixture",
      place: `times.${wrong}`,
      message: `Time ${wrong + 1} is ${times[wrong]}; times are counted from mixing and are 0 or above.`,
    };
  const prepared = courseOf(law, mixture);
  if (prepared.status !== "course") return prepared;
  const edges = edgesOf(tableOf(prepared.course, Math.max(0, ...times)));
  return {
    status: "predicted",
    points: times.map((time) => pointAt(edges, time)),
    flags: rangeFlags(law, mixture.concentrations),
  };
}

/** Integrals from 0 to u at a row of u, from which any other u is one short quadrature away. */
interface CourseTable {
  readonly course: Course;
  readonly rows: readonly { readonly u: number; readonly sums: Float64Array }[];
  readonly factor: ReturnType<typeof factors>;
}

/** The middle of the band, its late and its early edge. */
type Side = 0 | 1 | -1;

const STEP = 0.5;

function tableOf(course: Course, lastTime: number): CourseTable {
  const { law } = course;
  const rows = [{ u: 0, sums: new Float64Array(2 + law.parameters.length) }];
  const table: CourseTable = { course, rows, factor: factors(law.level) };
  for (let u = STEP; u <= course.lastU; u += STEP) {
    const sums = (rows.at(-1)?.sums ?? new Float64Array(0)).slice();
    if (!timeIntegrals(course, u - STEP, u, sums)) break;
    rows.push({ u, sums });
    if (timeOf(table, sums, -1, "newRun") > lastTime) break;
  }
  return table;
}

type Kind = "ofTheLaw" | "newRun";

/** t·e^(± half-width of ln t); t itself where there is no interval. */
function timeOf({ course, factor }: CourseTable, sums: Float64Array, side: Side, kind: Kind): number {
  const { law } = course;
  const [scaledTime = Number.NaN] = sums;
  if (scaledTime === 0) return 0;
  const logTime = Math.log(scaledTime) - law.logRateConstant;
  if (side === 0) return Math.exp(logTime);
  const prediction = logPrediction(law, logTime, gradientOf(course, sums));
  return Math.exp(logTime + side * (halfWidthOf(law, prediction, factor, kind) ?? 0));
}

function halfWidthOf(
  law: FittedLaw,
  { variance, newRunVariance, newRunDegreesOfFreedom }: LogPrediction,
  factor: CourseTable["factor"],
  kind: Kind,
): number | null {
  const withRun = kind === "newRun" && newRunVariance !== null;
  const times = factor(withRun ? newRunDegreesOfFreedom : law.degreesOfFreedom);
  const own = withRun ? newRunVariance : variance;
  return times === null || own === null ? null : times * Math.sqrt(own);
}

function gradientOf({ law }: Course, sums: Float64Array): readonly number[] {
  const [scaledTime = Number.NaN] = sums;
  return [-1, ...law.parameters.map((_, j) => (sums[1 + j] ?? Number.NaN) / scaledTime)];
}

/** The course or an edge of its band as times at every row of the table. */
interface Edge {
  readonly table: CourseTable;
  readonly side: Side;
  readonly kind: Kind;
  readonly times: Float64Array;
}

interface Edges {
  readonly best: Edge;
  /** Slow and fast; null where there is no interval. */
  readonly ofTheLaw: readonly [Edge, Edge] | null;
  readonly newRun: readonly [Edge, Edge] | null;
}

function edgesOf(table: CourseTable): Edges {
  const { law } = table.course;
  const edge = (side: Side, kind: Kind): Edge => ({
    table,
    side,
    kind,
    times: Float64Array.from(table.rows, ({ sums }) => timeOf(table, sums, side, kind)),
  });
  const hasInterval = law.covariance !== null && table.factor(law.degreesOfFreedom) !== null;
  const pair = (kind: Kind) => (hasInterval ? ([edge(1, kind), edge(-1, kind)] as const) : null);
  return {
    best: edge(0, "ofTheLaw"),
    ofTheLaw: pair("ofTheLaw"),
    newRun: law.betweenRunStandardDeviation === null ? null : pair("newRun"),
  };
}

function pointAt(edges: Edges, time: number): CourseBandPoint {
  const { course } = edges.best.table;
  const best = solve(edges.best, time);
  const extent: Banded = {
    value: extentAt(course, best.u),
    ofTheLaw: intervalAt(edges.ofTheLaw, time, best),
    newRun: intervalAt(edges.newRun, time, best),
  };
  return {
    time,
    extent,
    concentrations: Object.fromEntries(
      Object.entries(course.mixture.concentrations).map(([name, start]) => [
        name,
        concentrationOf(course, name, start, extent),
      ]),
    ),
  };
}

function intervalAt(pair: readonly [Edge, Edge] | null, time: number, best: Position): Interval | null {
  if (pair === null) return null;
  const [slow, fast] = pair;
  const { course } = slow.table;
  if (course.end.kind === "equilibrium") return intervalOfExtent(slow.table, best, slow.kind);
  return [extentAt(course, solve(slow, time).u), extentAt(course, solve(fast, time).u)];
}

function intervalOfExtent({ course, factor }: CourseTable, { u, sums }: Position, kind: Kind): Interval {
  const f = rateFactorAt(course, u) ?? 0;
  const value = extentAt(course, u);
  const [scaledTime = 0] = sums;
  const gradient = [scaledTime * f, ...course.law.parameters.map((_, j) => -f * (sums[1 + j] ?? 0))];
  const prediction = logPrediction(course.law, value, gradient, scaledTime * f);
  const half = halfWidthOf(course.law, prediction, factor, kind) ?? 0;
  return [Math.max(0, value - half), value + half];
}

function extentAt(course: Course, u: number): number {
  return u >= course.lastU ? course.end.extent : -course.end.extent * Math.expm1(-u);
}

function concentrationOf(course: Course, name: string, start: number, extent: Banded): Banded {
  const number = course.mixture.stoichiometricNumbers[name] ?? 0;
  const at = (x: number) => {
    const done = x >= course.end.extent && course.end.exhausted.includes(name);
    return done ? 0 : Math.max(0, start + number * x);
  };
  const turned = (interval: Interval | null): Interval | null => {
    if (interval === null) return null;
    const [low, high] = [at(interval[0]), at(interval[1])];
    return low <= high ? [low, high] : [high, low];
  };
  return { value: at(extent.value), ofTheLaw: turned(extent.ofTheLaw), newRun: turned(extent.newRun) };
}

interface Position {
  readonly u: number;
  /** Integrals from 0 to u. */
  readonly sums: Float64Array;
}

const MOST_ITERATIONS = 100;
/** Of the time, relative: far below what is drawn or printed. */
const SETTLED = 1e-11;

/** u at which the edge reaches `time`, by regula falsi with the Illinois rule; the end where it is never so late. */
function solve({ table, side, kind, times }: Edge, time: number): Position {
  const { course, rows } = table;
  const next = times.findIndex((reached) => reached >= time);
  const last = rows.at(-1);
  if (last === undefined) throw new RangeError("a table of a course begins at 0");
  if (next < 0) return { u: course.lastU, sums: last.sums };
  const upper = rows[next] ?? last;
  if (next === 0) return upper;
  const lower = rows[next - 1] ?? last;
  const sumsAt = (u: number) => {
    const sums = lower.sums.slice();
    timeIntegrals(course, lower.u, u, sums);
    return sums;
  };
  // ln t is nearly straight in u away from the start, t itself next to it.
  const miss = (sums: Float64Array) => {
    const at = timeOf(table, sums, side, kind);
    return lower.u === 0 ? at / time - 1 : Math.log(at / time);
  };
  let [a, fa] = [lower.u, miss(lower.sums)];
  let [b, fb] = [upper.u, miss(upper.sums)];
  let sums = upper.sums;
  for (let i = 0; i < MOST_ITERATIONS && b - a > SETTLED * b && fb !== 0; i++) {
    const u = i % 8 === 7 ? (a + b) / 2 : (a * fb - b * fa) / (fb - fa);
    sums = sumsAt(u);
    const f = miss(sums);
    if (Math.abs(f) <= SETTLED) return { u, sums };
    if (f > 0) {
      [b, fb] = [u, f];
      fa /= 2;
    } else {
      [a, fa] = [u, f];
      fb /= 2;
    }
  }
  return { u: b, sums };
}
