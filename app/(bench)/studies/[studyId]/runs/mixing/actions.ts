"use server";

import { notFound } from "next/navigation";
import { refused } from "@/app/_server/action-result";
import { memberAction } from "@/app/_server/member-action";
import { changeWithEffect } from "@/app/_server/study-change";
import { stockName } from "@/app/_worksheet/mixing/mixing-input";
import { workedOut } from "@/app/_worksheet/worked-out";
import { newIdentifier } from "@/db/identifier";
import type { Sheet } from "@/db/sheet/sheet.schema";
import { changeStudy } from "@/db/study/change-study";
import { readStudy } from "@/db/study/study.queries";
import { type MixingShape, mixingCells, newMixture, readMixingCells } from "../_mixing/mixing-row";
import { stockHead } from "../_mixing/stock-amounts";
import { keptRows } from "../kept-rows";
import { rowsInput } from "../schema";
import { withoutStock, withStock } from "./change-stocks";
import { readDispensingForm } from "./dispensing-form";
import { dispensingInput, removeStockInput, stockInput } from "./schema";
import { readStockForm } from "./stock-form";

/** Keeps the volumes of edited and new rows as one revision; their concentrations follow in it. */
export const keepVolumes = memberAction(rowsInput, "analyst", ({ db, actor, input }) =>
  keptRows(db, actor, input, (sheet) => {
    const shape = shapeOf(sheet);
    return {
      edit: (cells, before) => readMixingCells(cells, before, shape),
      make: (row, id) => newMixture(row, id, shape),
      cellsOf: (run) => mixingCells(run, shape),
    };
  }),
);

function shapeOf({ stocks, mixing }: Sheet): MixingShape {
  return {
    stocks: stocks.map((stock) => ({ id: stock.id, head: stockHead(stock) })),
    unit: mixing.volumeUnit,
  };
}

const NOT_READ = "Nothing was kept: some boxes are not read yet.";

/** Adds a stock or changes one; every run that draws from it follows. */
export const keepStock = memberAction(stockInput, "analyst", async ({ db, actor, input }) => {
  const study = (await readStudy(db, actor, input.studyId)) ?? notFound();
  const reading = readStockForm(input.form, study.sheet);
  if (reading.status === "faults") return refused(NOT_READ, fieldsOf(reading.faults));
  const { stock } = reading;
  const { stockId } = input;
  if (stockId !== null && !study.sheet.stocks.some((one) => one.id === stockId))
    return refused("This stock is not on the list any more. Load the page again.");
  const done = stockId === null ? "added" : "changed";
  return changeWithEffect(db, actor, input.studyId, () =>
    changeStudy(
      db,
      actor,
      input,
      { verb: `stock ${done}`, summary: `Stock ${stockName(stock)} ${done}.` },
      (sheet) => withStock(sheet, stockId ?? newIdentifier(), stock),
      workedOut,
    ),
  );
});

/** Takes a stock off the list where nothing draws from it. */
export const removeStock = memberAction(removeStockInput, "analyst", ({ db, actor, input }) =>
  changeWithEffect(db, actor, input.studyId, () =>
    changeStudy(
      db,
      actor,
      input,
      {
        verb: "stock removed",
        summary: ({ stocks }) => {
          const stock = stocks.find(({ id }) => id === input.stockId);
          return `Stock ${stock === undefined ? "" : stockName(stock)} removed.`;
        },
      },
      (sheet) => withoutStock(sheet, input.stockId),
      workedOut,
    ),
  ),
);

/** Keeps mark, unit and uncertainties of deliveries; every mixture follows. */
export const keepDispensing = memberAction(dispensingInput, "analyst", async ({ db, actor, input }) => {
  const reading = readDispensingForm(input.form);
  if (reading.status === "faults") return refused(NOT_READ, fieldsOf(reading.faults));
  return changeWithEffect(db, actor, input.studyId, () =>
    changeStudy(
      db,
      actor,
      input,
      { verb: "volumes changed", summary: "Mark and deliveries of the mixtures changed." },
      (sheet) => ({ ...sheet, mixing: reading.mixing }),
      workedOut,
    ),
  );
});

function fieldsOf(faults: Readonly<Record<string, string>>) {
  return Object.entries(faults).map(([path, message]) => ({ path, message }));
}
