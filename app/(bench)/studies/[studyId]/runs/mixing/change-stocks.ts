import { inARow, verb } from "kinetics-core/quantities";
import { stockName } from "@/app/_worksheet/mixing/mixing-input";
import { presentRuns } from "@/app/_worksheet/present-runs";
import type { Sheet, SheetStock } from "@/db/sheet/sheet.schema";
import type { Refusal } from "@/db/study/change-study";

/** A new stock stands after the others; one that was there keeps its place. */
export function withStock(
  sheet: Sheet,
  id: string,
  stock: Omit<SheetStock, "id" | "position">,
): Sheet | Refusal {
  const before = sheet.stocks.find((one) => one.id === id);
  const position =
    before?.position ?? sheet.stocks.reduce((next, one) => Math.max(next, one.position + 1), 0);
  const made = { id, position, ...stock };
  return {
    ...sheet,
    stocks:
      before === undefined
        ? [...sheet.stocks, made]
        : sheet.stocks.map((one) => (one.id === id ? made : one)),
  };
}

const MOST_NAMED = 4;

/** A stock leaves where no run and no dilution draws from it; volumes of 0 leave with it. */
export function withoutStock(sheet: Sheet, id: string): Sheet | Refusal {
  const stock = sheet.stocks.find((one) => one.id === id);
  if (stock === undefined) return { refused: "This stock is not on the list any more. Load the page again." };
  const name = stockName(stock);
  const runs = presentRuns(sheet).flatMap((run) => ((run.volumes[id] ?? 0) > 0 ? [run.label] : []));
  if (runs.length > 0) {
    return {
      refused: `${inARow(runs, MOST_NAMED)} ${verb(runs.length, "takes", "take")} a volume of stock ${name}. Empty those volumes first, or keep the stock.`,
    };
  }
  const diluted = sheet.stocks.filter((one) => one.dilution?.fromStockId === id).map(stockName);
  if (diluted.length > 0)
    return {
      refused: `${inARow(diluted)} ${verb(diluted.length, "is", "are")} diluted from stock ${name}. Say what else ${verb(diluted.length, "it was", "they were")} made from, or keep the stock.`,
    };
  return {
    ...sheet,
    stocks: sheet.stocks.filter((one) => one.id !== id),
    runs: sheet.runs.map((run) => {
      if (run.removedIn !== null || run.volumes[id] === undefined) return run;
      const { [id]: _empty, ...volumes } = run.volumes;
      return { ...run, volumes };
    }),
  };
}
