import type { Kysely } from "kysely";
import type { Database } from "../database";
import type { Actor } from "../member/actor";
import { rowsInWords } from "../sheet/row-words";
import type { Sheet } from "../sheet/sheet.schema";
import { rowsOf, touchedRows } from "../sheet/sheet-rows";
import { type ChangeResult, type ChangeTarget, changeStudy, type Derive } from "./change-study";
import type { SetUp } from "./set-up.schema";

/**
 * Saves the Set-up station as a whole. Rows that somebody else changed meanwhile and this form left alone stay as
 * they are. A species that leaves takes its order with it; what runs held of it stays with them. `derive` works out what
 * follows from what the form says.
 */
export function saveSetUp(
  db: Kysely<Database>,
  actor: Actor,
  target: ChangeTarget,
  setUp: SetUp,
  derive?: Derive,
): Promise<ChangeResult> {
  return changeStudy(
    db,
    actor,
    target,
    {
      verb: "set-up changed",
      summary: (before, after) =>
        `Changed ${rowsInWords(touchedRows(rowsOf(before), rowsOf(after)), after, before)}.`,
    },
    (sheet) => withSetUp(sheet, setUp),
    derive,
  );
}

/** The sheet with the Set-up station as its form has it. */
export function withSetUp(sheet: Sheet, { study, ...rest }: SetUp): Sheet {
  const species = new Set(rest.species.map((one) => one.id));
  return {
    ...sheet,
    ...rest,
    conditions: { ...sheet.conditions, ...rest.conditions },
    signal: withStandards(sheet.signal, rest.signal),
    study: { ...study, invented: sheet.study.invented },
    orders: Object.fromEntries(Object.entries(sheet.orders).filter(([id]) => species.has(id))),
  };
}

/** What the standards say of the signal stays; a factor that is typed over theirs is typed from then on. */
function withStandards(before: Sheet["signal"], typed: SetUp["signal"]): Sheet["signal"] {
  if (typed?.kind !== "calibrated") return typed;
  const known = before?.kind === "calibrated" ? before : null;
  const same =
    known !== null &&
    known.perMolar.value === typed.perMolar.value &&
    known.perMolar.standardUncertainty === typed.perMolar.standardUncertainty;
  return { ...typed, source: same ? known.source : "typed" };
}
