import { printNumber } from "kinetics-core/quantities";
import type { Check } from "../analysis";
import { studyCheck } from "./check";
import type { Checked } from "./find-checks";

/**
 * Blocks: runs of one day, lot, instrument or operator share what those bring. The law counts a difference between blocks as a
 * random term beside the scatter of the runs (rules of the library: a block is a REML random term); here it is said how many
 * there are, and what keeps them from being told apart.
 */
export function blockChecks({ carrying, law }: Checked): readonly Check[] {
  const blocks = new Map<string, number>();
  let unnamed = 0;
  for (const { run } of carrying) {
    if (run.block === null) unnamed += 1;
    else blocks.set(run.block, (blocks.get(run.block) ?? 0) + 1);
  }
  if (blocks.size === 0 || (blocks.size === 1 && unnamed === 0)) return [];
  if (unnamed > 0)
    return [
      found(
        "weakens",
        `${unnamed} of the runs name${unnamed === 1 ? "s" : ""} no block and ${carrying.length - unnamed} do, so that what they share is not counted. Fill in the column “block” for every run, or empty it.`,
      ),
    ];
  const names = [...blocks].map(([name, runs]) => `${name} (${runs})`).join(", ");
  const between = law.fit?.betweenBlockStandardDeviation ?? null;
  if (between === null) return [found("note", `The runs come from ${blocks.size} blocks: ${names}.`)];
  return [
    found(
      "note",
      `The runs come from ${blocks.size} blocks: ${names}. Rates differ between blocks by ${printNumber(between * 100, 2)} %, which is in the uncertainty of *k*.`,
    ),
  ];
}

function found(severity: Check["severity"], message: string): Check {
  return studyCheck("runs", severity, "blocks-differ", message);
}
