import { normalQuantile } from "kinetics-core/distributions";
import { median, medianOfSorted } from "kinetics-core/summation";
import { countedPlaces, type TraceCounts } from "./counted-readings";
import type { Trace } from "./initial-rate";

/**
 * Which readings stand off their neighbours, as a proposal for a person to look at.
 *
 * A spike (a bubble, dust, a mains pulse) is one reading or two beside each other that the readings around do not share.
 * Each reading is compared with what its neighbours say of its time: the five on its left and the five on its right
 * make 25 straight lines, and d_i = S_i − median of the 25. That median stands until 13 are wrong; one wrong neighbour
 * spoils five and two on one side ten, so that spikes, single or twin, move neither their neighbours nor each other.
 *
 * Curvature bends all lines alike: for a curve of second derivative S″ a line from h₁ before to h₂ after misses by
 * S″h₁h₂/2. That changes slowly along the trace, so that the local median of d, over 15 readings, takes it out: e_i = d_i − med d.
 *
 * The scale s of e is 1.4826 times its median absolute value (for normal errors the standard deviation, Rousseeuw and
 * Croux 1993), of the whole trace or of the same 15 readings, whichever is more: noise that grows in one part must not
 * make spikes there. A reading is proposed where |e_i| > z·s, z being the normal quantile at which a trace of N
 * readings without a spike has one proposed in 5 % of cases at most (Bonferroni over both sides), and where it stands
 * off by more than a thousandth of the trace's height: less does no harm, and a trace without noise has s near nothing.
 * More than two beside each other are a step or a drift, which no marking mends, and are not proposed.
 */
export interface ProposedSpikes {
  /** Places in the trace from 0, rising. */
  readonly places: readonly number[];
  /** What each of them stands off its neighbours by at least, in the unit of the signal. */
  readonly standOff: number;
}

/** Readings on each side that lines are drawn from: with four, twin spikes would spoil half of the lines. */
const NEIGHBOURS = 5;
/** Readings on each side whose differences make the local median and the local scale. */
const LOCAL = 7;
/** Readings beside each other that one spike can take. */
const LONGEST_SPIKE = 2;
/** Chance that a trace without a spike has one proposed. */
const FALSE_PROPOSALS = 0.05;
/** Of the height of the trace: what stands off by less moves no rate. */
const LEAST_HEIGHT = 0.001;
/** Median absolute deviation to standard deviation, 1/Φ⁻¹(¾). */
const NORMAL_SCALE = 1.4826;

/**
 * Looks among the readings that count. The first and last five have no neighbours on one side and are left to the
 * eye. Times that do not increase propose nothing, and neither do fewer readings than a local median needs.
 */
export function proposeSpikes(trace: Trace, counts: TraceCounts): ProposedSpikes {
  const places = countedPlaces(trace, counts);
  const count = places.length;
  if (count < 2 * (LOCAL + NEIGHBOURS) + 1 || !isIncreasing(trace, places))
    return { places: [], standOff: 0 };
  const standing = standingOff(trace, places);
  const magnitudes = standing.map(Math.abs);
  const overall = NORMAL_SCALE * median(magnitudes);
  const floor = LEAST_HEIGHT * heightOf(trace, places);
  const z = normalQuantile(1 - FALSE_PROPOSALS / (2 * standing.length));
  const found: number[] = [];
  const near = new Float64Array(2 * LOCAL + 1);
  for (let i = 0; i < standing.length; i++) {
    const size = magnitudes[i] ?? 0;
    if (!(size > Math.max(z * overall, floor))) continue;
    if (size > z * NORMAL_SCALE * medianAround(magnitudes, i, near)) found.push(places[i + NEIGHBOURS] ?? 0);
  }
  return { places: withoutSteps(found), standOff: Math.max(z * overall, floor) };
}

/** Leaves out what stands in a row of more than two. */
function withoutSteps(places: readonly number[]): number[] {
  return places.filter((place, i) => {
    let row = 1;
    for (let back = 1; places[i - back] === place - back; back++) row++;
    for (let on = 1; places[i + on] === place + on; on++) row++;
    return row <= LONGEST_SPIKE;
  });
}

/** e of every reading that has five neighbours on each side. */
function standingOff({ time, signal }: Trace, places: Int32Array): Float64Array {
  const differences = new Float64Array(places.length - 2 * NEIGHBOURS);
  const lines = new Float64Array(NEIGHBOURS * NEIGHBOURS);
  const timeOf = (i: number) => time[places[i] ?? 0] ?? Number.NaN;
  const signalOf = (i: number) => signal[places[i] ?? 0] ?? Number.NaN;
  for (let k = 0; k < differences.length; k++) {
    const i = k + NEIGHBOURS;
    const at = timeOf(i);
    let line = 0;
    for (let before = i - NEIGHBOURS; before < i; before++) {
      const t = timeOf(before);
      const s = signalOf(before);
      for (let after = i + 1; after <= i + NEIGHBOURS; after++) {
        lines[line++] = s + ((signalOf(after) - s) * (at - t)) / (timeOf(after) - t);
      }
    }
    differences[k] = signalOf(i) - medianOfSorted(lines.sort());
  }
  const near = new Float64Array(2 * LOCAL + 1);
  return differences.map((difference, k) => difference - medianAround(differences, k, near));
}

/** Median of the values around a place; at the ends of those that there are. `room`: 2·LOCAL + 1 numbers. */
function medianAround(values: Float64Array, place: number, room: Float64Array): number {
  const from = Math.max(0, place - LOCAL);
  const to = Math.min(values.length, place + LOCAL + 1);
  const window = room.subarray(0, to - from);
  window.set(values.subarray(from, to));
  return medianOfSorted(window.sort());
}

/** From the 5 % to the 95 % quantile, so that a spike does not raise the bar for itself. */
function heightOf({ signal }: Trace, places: Int32Array): number {
  const sorted = Float64Array.from(places, (place) => signal[place] ?? 0).sort();
  const at = (part: number) => sorted[Math.round(part * (sorted.length - 1))] ?? 0;
  return at(0.95) - at(0.05);
}

function isIncreasing({ time, signal }: Trace, places: Int32Array): boolean {
  for (let i = 0; i < places.length; i++) {
    if (!Number.isFinite(signal[places[i] ?? 0])) return false;
    if (i > 0 && !((time[places[i] ?? 0] ?? Number.NaN) > (time[places[i - 1] ?? 0] ?? Number.NaN)))
      return false;
  }
  return true;
}
