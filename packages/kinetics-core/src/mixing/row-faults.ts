import { numberInWords } from "kinetics-core/quantities";
import type { Device, MeasuredVolume, MixingRefusal, Portion, RefusedRow, Stock, Total } from "./mixing";

/** What is wrong with one row, before anything is computed from it; each as a sentence that names the row. */

/** Rounding of sums and of unit conversion must not put a full flask above its mark. */
const ABOVE_THE_MARK = 1e-9;
/** Sizes, zero aside, whose products, quotients and squares stay within what a double holds. */
const LEAST_SIZE = 1e-40;
const GREATEST_SIZE = 1e40;

export function refused(label: string, code: MixingRefusal, message: string): RefusedRow {
  return { status: "refused", label, code, message };
}

/** An uncertainty may be as small as it likes: it then counts for nothing. */
function isBenchSize(value: number, uncertainty: number): boolean {
  const size = Math.abs(value);
  return (
    (size === 0 || (size >= LEAST_SIZE && size <= GREATEST_SIZE)) && !(Math.abs(uncertainty) > GREATEST_SIZE)
  );
}

function beyondPrecision(label: string, what: string): RefusedRow {
  return refused(
    label,
    "beyond-precision",
    `${what} has a size that no bench has. Check the power of ten and the unit.`,
  );
}

export function deviceFault({ name, relative }: Device): RefusedRow | null {
  if (relative >= 0 && relative <= 1) return null;
  return refused(
    name,
    "bad-device",
    `The calibration uncertainty of ${name} is not a number from 0 to 1. Give it as a part of the volume, 0.002 for 0.2 %.`,
  );
}

export function stockFault({ name, solutes }: Stock): RefusedRow | null {
  for (const solute of solutes) {
    const { value, standardUncertainty } = solute.concentration;
    if (
      !Number.isFinite(value) ||
      value < 0 ||
      !Number.isFinite(standardUncertainty) ||
      standardUncertainty < 0
    )
      return refused(
        name,
        "bad-concentration",
        `Stock ${name}: the concentration of ${solute.name} and its uncertainty must be numbers from 0 up. Correct them.`,
      );
    if (!isBenchSize(value, standardUncertainty)) return beyondPrecision(name, `Stock ${name}`);
    const species = Object.entries(solute.species).find(([, count]) => !(count > 0 && isBenchSize(count, 0)));
    if (species !== undefined)
      return refused(
        name,
        "bad-concentration",
        `Stock ${name}: one formula unit of ${solute.name} gives a number of ${species[0]} above 0, or ${species[0]} is left out.`,
      );
  }
  return null;
}

/** @returns the total volume, or what is wrong with the row. `what` is "Run R03" or "Solution B/10". */
export function totalVolumeOf(
  label: string,
  what: string,
  portions: readonly Portion[],
  total: Total | null,
  devices: ReadonlySet<string>,
): number | RefusedRow {
  for (const portion of portions) {
    const of = portion.solution ?? "solvent";
    const fault = volumeFault(label, `${what}: the volume of ${of}`, portion, devices);
    if (fault !== null) return fault;
  }
  const sum = portions.reduce((all, portion) => all + portion.volume, 0);
  if (total === null || (total.kind === "sum" && !(sum > 0)))
    return refused(
      label,
      "no-total",
      `${what} has no total volume. Give the volumes of its portions, or the mark that it was made up to.`,
    );
  if (total.kind === "sum") return sum;
  const fault = volumeFault(label, `${what}: the total volume`, total, devices);
  if (fault !== null) return fault;
  if (total.volume === 0)
    return refused(label, "no-total", `${what} was made up to a mark of 0. Give the volume of the mark.`);
  if (sum > total.volume * (1 + ABOVE_THE_MARK))
    return refused(
      label,
      "above-the-mark",
      `${what}: the portions come to ${numberInWords(sum)}, above the mark of ${numberInWords(total.volume)}. Correct a volume or the mark.`,
    );
  return total.volume;
}

function volumeFault(
  label: string,
  what: string,
  { volume, standardUncertainty = 0, device }: MeasuredVolume,
  devices: ReadonlySet<string>,
): RefusedRow | null {
  if (!Number.isFinite(volume))
    return refused(label, "volume-missing", `${what} is missing. Give it, or 0 where there is none.`);
  if (!isBenchSize(volume, standardUncertainty)) return beyondPrecision(label, what);
  if (volume < 0)
    return refused(
      label,
      "volume-negative",
      `${what} is ${numberInWords(volume)}; a volume is not below 0. Correct it.`,
    );
  if (!Number.isFinite(standardUncertainty) || standardUncertainty < 0)
    return refused(
      label,
      "uncertainty-negative",
      `${what} has an uncertainty that is not a number from 0 up. Correct it, or leave it out.`,
    );
  if (device !== undefined && !devices.has(device))
    return refused(
      label,
      "device-missing",
      `${what} was delivered with ${device}, which is not among the devices. Add it, or correct the name.`,
    );
  return null;
}
