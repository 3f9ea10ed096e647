import { type MixedRow, mixRuns } from "kinetics-core/mixing";
import { printNumber, printUncertain } from "kinetics-core/quantities";
import { concentrationDisplay } from "@/app/_worksheet/display-units";
import { mixingInput, mixingName, type Preparation, stockName } from "@/app/_worksheet/mixing/mixing-input";
import { isMixed, stockedSpecies } from "@/db/sheet/mixed-run";
import type { SheetRun, SheetSpecies, SheetStock } from "@/db/sheet/sheet.schema";
import { MARK, VOLUME, VOLUME_UNITS, volumeText } from "./mixing-row";

/** What a row of volumes comes to, as texts of the computed columns, on the server and while typing alike. */
export type Mixture =
  /** No volume yet. */
  | { readonly status: "empty" }
  | {
      readonly status: "mixed";
      readonly total: string;
      /** By species id: "50.0 ± 0.4" in the species' unit. */
      readonly concentrations: Readonly<Record<string, string>>;
      /** In mol L⁻¹; "" where the charges of its species are not known. */
      readonly ionicStrength: string;
    }
  | { readonly status: "refused"; readonly total: string; readonly refusal: Refusal };

/** Why a row is not mixed, by how much, and what would repair it. */
export interface Refusal {
  readonly title: string;
  readonly detail: string;
  /** Columns whose text is wrong. */
  readonly columns: readonly string[];
  readonly repairs: readonly { readonly label: string; readonly columnId: string; readonly text: string }[];
}

type Volumes = Pick<SheetRun, "label" | "volumes" | "markMicrolitre">;

export const TOTAL = "total";
export const CONCENTRATION = "c:";
export const STRENGTH = "strength";

/** Species of the law that stocks hold: their concentrations follow from the volumes. */
export function mixedSpecies({ species, stocks }: Preparation): readonly SheetSpecies[] {
  const stocked = stockedSpecies(stocks);
  return species.filter(({ id, inLaw }) => inLaw && stocked.has(id)).sort((a, b) => a.position - b.position);
}

/** In the order of the runs. */
export function mixturesOf(preparation: Preparation, runs: readonly Volumes[]): readonly Mixture[] {
  const mixed = mixRuns(
    mixingInput(
      preparation,
      // Labels name the rows of the call; two runs that share one while it is typed must not refuse each other.
      runs.map((run, index) => ({ ...run, label: String(index) })),
    ),
  ).runs;
  return runs.map((run, index): Mixture => {
    const row = mixed[index];
    if (!isMixed(run) || row === undefined) return { status: "empty" };
    if (row.status === "mixed") return mixtureOf(preparation, run, row);
    const total = volumeText(sumOf(run), preparation.mixing.volumeUnit);
    const overfull = row.code === "above-the-mark" ? overfullRow(preparation, run) : null;
    return {
      status: "refused",
      total,
      refusal: overfull ?? {
        title: `${run.label} is not mixed`,
        detail: row.message.replace(`Run ${index}`, `Run ${run.label}`),
        columns: [],
        repairs: [],
      },
    };
  });
}

function mixtureOf(preparation: Preparation, run: Volumes, row: MixedRow): Mixture {
  const { volumeUnit } = preparation.mixing;
  const sum = volumeText(sumOf(run), volumeUnit);
  const total = volumeText(row.totalVolume ?? sumOf(run), volumeUnit);
  return {
    status: "mixed",
    total: sum === total ? total : `${sum} to ${total}`,
    concentrations: Object.fromEntries(
      mixedSpecies(preparation).map((species) => {
        const name = mixingName(species);
        const { factor } = concentrationDisplay(species.unit);
        const value = (row.concentrations[name] ?? 0) * factor;
        const uncertainty = (row.standardUncertainties[name] ?? 0) * factor;
        return [species.id, plainPair(value, uncertainty)];
      }),
    ),
    ionicStrength: strengthText(row.ionicStrength?.value ?? null),
  };
}

function strengthText(molar: number | null): string {
  if (molar === null) return "";
  return molar === 0 ? "0" : printNumber(molar, 3);
}

function plainPair(value: number, uncertainty: number): string {
  const printed = printUncertain(value, uncertainty, { digits: 1, power: 0 });
  return printed.uncertainty === null ? printed.value : `${printed.value} ± ${printed.uncertainty}`;
}

function sumOf({ volumes }: Pick<SheetRun, "volumes">): number {
  return Object.values(volumes).reduce((sum, volume) => sum + volume, 0);
}

/** Equal to this part counts as the same volume, as read from a pipette. */
const SAME_VOLUME = 0.005;

function overfullRow({ stocks, mixing }: Preparation, run: Volumes): Refusal {
  const unit = mixing.volumeUnit;
  const written = (microlitre: number) => volumeText(microlitre, unit);
  const sum = sumOf(run);
  const mark = run.markMicrolitre ?? mixing.markMicrolitre ?? sum;
  const excess = sum - mark;
  const taken = stocks.map((stock) => ({ stock, volume: run.volumes[stock.id] ?? 0 }));
  const medium = taken
    .filter(({ stock, volume }) => isMedium(stock) && volume >= excess)
    .sort((a, b) => b.volume - a.volume)[0];
  const forgotten = taken.find(
    ({ stock, volume }) => stock !== medium?.stock && Math.abs(volume - excess) <= SAME_VOLUME * excess,
  );
  return {
    title: `${run.label} adds to ${written(sum)} ${VOLUME_UNITS[unit]}, ${written(excess)} over the mark of ${written(mark)}`,
    detail:
      forgotten === undefined || medium === undefined
        ? ""
        : `That is the volume of ${forgotten.stock.symbol === "" ? forgotten.stock.name : `stock ${forgotten.stock.symbol}`}: ${stockName(medium.stock)} may have been worked out without it.`,
    columns: [TOTAL, ...(medium === undefined ? [] : [VOLUME + medium.stock.id])],
    repairs: [
      ...(medium === undefined
        ? []
        : [
            {
              label: `Set ${stockName(medium.stock)} to ${written(medium.volume - excess)}`,
              columnId: VOLUME + medium.stock.id,
              text: written(medium.volume - excess),
            },
          ]),
      { label: `Make the mark ${written(sum)}`, columnId: MARK, text: written(sum) },
    ],
  };
}

/** Water, a buffer without what counts: what mixtures are filled up with. */
export function isMedium({ contents, dilution }: Pick<SheetStock, "contents" | "dilution">): boolean {
  return dilution === null && Object.keys(contents).length === 0;
}
