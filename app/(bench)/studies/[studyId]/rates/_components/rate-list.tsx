"use client";

import Link from "next/link";
import { RunMark } from "@/app/_ui/run-mark";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import { AlignedNumber } from "@/app/_ui/value";
import type { RateRow, RatesView } from "../view";

const ORIGINS: Readonly<Record<RateRow["origin"], string>> = {
  trace: "",
  "by hand": "window by hand",
  entered: "entered",
  none: "",
};

/** All runs with their rates; the one that is looked at is marked. */
export function RateList({
  rates,
  current,
  address,
}: {
  rates: RatesView;
  current: string;
  address: (label: string) => string;
}) {
  const unit = rates.ratePower === 0 ? rates.rateUnit : `10^${rates.ratePower} ${rates.rateUnit}`;
  return (
    <>
      <DataTable caption="Initial rates of all runs">
        <thead>
          <tr>
            <ColumnHead>Run</ColumnHead>
            <ColumnHead numeric unit={unit}>
              Initial rate
            </ColumnHead>
          </tr>
        </thead>
        <tbody>
          {rates.runs.map((row) => (
            <tr key={row.runId} className={rowClass(row, current)}>
              <td>
                <Link
                  href={address(row.label)}
                  className="no-underline"
                  aria-current={row.runId === current ? "true" : undefined}
                  scroll={false}
                >
                  <RunMark mark={row.mark} label={row.label} state={row.state} />
                </Link>
              </td>
              <td className="num">
                {row.rate === null ? (
                  <span className="text-ink-3">no rate</span>
                ) : (
                  <>
                    <AlignedNumber text={row.rate.value} {...rates.rates} />
                    <span className="ml-1.5 inline-block min-w-[5.4ch] text-left text-caption text-ink-2">
                      {row.rate.uncertainty === null ? "" : `± ${row.rate.uncertainty}`}
                    </span>
                  </>
                )}
                {ORIGINS[row.origin] !== "" && (
                  <small className="block text-label text-ink-3">{ORIGINS[row.origin]}</small>
                )}
              </td>
            </tr>
          ))}
        </tbody>
      </DataTable>
      <p className="pt-1.5 text-label text-ink-3">± is one standard uncertainty of the run alone.</p>
    </>
  );
}

function rowClass(row: RateRow, current: string): string | undefined {
  const classes = [row.runId === current ? "standing" : "", row.state === "set-aside" ? "set-aside" : ""];
  return classes.filter((one) => one !== "").join(" ") || undefined;
}
