"use client";

import { useState } from "react";
import { Button } from "@/app/_ui/button";
import { Prose } from "@/app/_ui/prose";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import { removeStock } from "../actions";
import type { StockForm } from "../schema";
import { EMPTY_STOCK } from "../stock-form";
import type { SpeciesChoice, StockRow } from "../view";
import { useMixingChange } from "./mixing-change";
import { StockDialog } from "./stock-dialog";

/** The bottles that volumes are taken from. */
export function StockTable({
  studyId,
  revision,
  stocks,
  species,
  volumeUnit,
  sharedNote,
  canEdit,
}: {
  studyId: string;
  revision: number;
  stocks: readonly StockRow[];
  species: readonly SpeciesChoice[];
  volumeUnit: string;
  sharedNote: string;
  canEdit: boolean;
}) {
  const { report } = useMixingChange();
  const [open, setOpen] = useState<{ stockId: string | null; form: StockForm } | null>(null);

  return (
    <section>
      {stocks.length > 0 && (
        <DataTable caption="Stocks" className="min-w-[720px]">
          <thead>
            <tr>
              <ColumnHead>Stock</ColumnHead>
              <ColumnHead>Holds</ColumnHead>
              <ColumnHead>Concentration</ColumnHead>
              <ColumnHead numeric unit="%">
                Relative <i>u</i>
              </ColumnHead>
              <ColumnHead className="pl-5">Lot, made</ColumnHead>
              <ColumnHead>How known</ColumnHead>
              {canEdit && (
                <th scope="col">
                  <span className="sr-only">Change</span>
                </th>
              )}
            </tr>
          </thead>
          <tbody>
            {stocks.map((stock) => (
              <tr key={stock.stockId}>
                <td className="law text-[18px]">{stock.symbol}</td>
                <th scope="row">{stock.holds}</th>
                <td>
                  {stock.concentrations.map((line) => (
                    <span key={line} className="block whitespace-nowrap">
                      <Prose text={line} />
                    </span>
                  ))}
                </td>
                <td className="num">{stock.relative}</td>
                <td className="whitespace-nowrap pl-5">{stock.lot}</td>
                <td>{stock.howKnown}</td>
                {canEdit && (
                  <td className="whitespace-nowrap text-right">
                    <Button
                      kind="text"
                      aria-label={`Edit stock ${stock.name}`}
                      onClick={() => setOpen({ stockId: stock.stockId, form: stock.form })}
                    >
                      Edit
                    </Button>{" "}
                    <Button
                      kind="text"
                      aria-label={`Remove stock ${stock.name}`}
                      onClick={async () =>
                        report(await removeStock({ studyId, base: revision, stockId: stock.stockId }))
                      }
                    >
                      Remove
                    </Button>
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </DataTable>
      )}
      <div className="mt-2.5 flex flex-wrap items-center gap-x-3 gap-y-1.5">
        {canEdit && (
          <Button size="small" onClick={() => setOpen({ stockId: null, form: EMPTY_STOCK })}>
            Add a stock
          </Button>
        )}
        <span className="text-label text-ink-3">{sharedNote}</span>
      </div>
      {open !== null && (
        <StockDialog
          key={open.stockId ?? "new"}
          studyId={studyId}
          revision={revision}
          stockId={open.stockId}
          before={open.form}
          species={species}
          others={stocks.filter(({ stockId }) => stockId !== open.stockId)}
          volumeUnit={volumeUnit}
          onClose={() => setOpen(null)}
        />
      )}
    </section>
  );
}
