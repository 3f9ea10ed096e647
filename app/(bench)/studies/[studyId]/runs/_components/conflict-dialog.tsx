"use client";

import { Button } from "@/app/_ui/button";
import { Dialog } from "@/app/_ui/dialog";
import type { RowConflict } from "./use-run-draft";

/** Both versions of the cells that two people changed, and which one goes on. */
export function ConflictDialog({
  conflict,
  columns,
  onTakeTheirs,
  onPutMineOver,
}: {
  conflict: RowConflict | null;
  columns: readonly { readonly id: string; readonly label: string }[];
  onTakeTheirs: () => void;
  onPutMineOver: () => void;
}) {
  const cells = (conflict?.rows ?? []).flatMap((row) =>
    Object.entries(row.cells).flatMap(([column, mine]) => {
      const theirs = conflict?.theirs[row.runId ?? ""];
      const head = columns.find(({ id }) => id === column)?.label ?? column;
      const text = theirs?.[column];
      return theirs === undefined || text === undefined || text === mine
        ? []
        : [
            {
              key: `${row.key} ${column}`,
              run: theirs.label ?? row.cells.label ?? "",
              head,
              mine,
              theirs: text,
            },
          ];
    }),
  );
  return (
    <Dialog
      open={conflict !== null}
      onOpenChange={(open) => !open && onTakeTheirs()}
      title="Somebody else changed the same run"
      lead="Your change was not kept yet. Whichever you choose, the other stays in the history."
      actions={
        <>
          <Button onClick={onTakeTheirs}>Keep theirs</Button>
          <Button kind="primary" onClick={onPutMineOver}>
            Put mine over theirs
          </Button>
        </>
      }
    >
      <table className="data-table mt-3">
        <thead>
          <tr>
            <th scope="col">Run</th>
            <th scope="col">Column</th>
            <th scope="col">Theirs</th>
            <th scope="col">Yours</th>
          </tr>
        </thead>
        <tbody>
          {cells.map((cell) => (
            <tr key={cell.key}>
              <th scope="row">{cell.run}</th>
              <td>{cell.head}</td>
              <td>{cell.theirs || "empty"}</td>
              <td>{cell.mine || "empty"}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </Dialog>
  );
}
