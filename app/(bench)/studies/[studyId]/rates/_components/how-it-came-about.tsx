"use client";

import { DependenceFigure } from "@/app/_figures/dependence-figure";
import { typeset } from "@/app/_ui/prose";
import { SectionTitle } from "@/app/_ui/sheet";
import { ColumnHead, DataTable } from "@/app/_ui/table";
import { Value } from "@/app/_ui/value";
import type { EstimateView } from "../estimate-view";
import type { EstimatorRow, RunRateView } from "../view";

/** What the answer would be had the window ended elsewhere. */
export function DependencePart({ run }: { run: RunRateView }) {
  if (run.dependence === null) return null;
  return (
    <DependenceFigure
      view={run.dependence}
      label={`Initial rate of ${run.label} against window end`}
      number={2}
      caption="How the answer depends on where the window ends, by the same fit. Band: one standard uncertainty."
    />
  );
}

/** Shares of u², with a bar each. */
export function SourceTable({ estimate }: { estimate: EstimateView }) {
  if (estimate.combined === null) return null;
  return (
    <div>
      <p className="mb-1 text-label">Where the uncertainty comes from</p>
      <DataTable caption="Where the uncertainty comes from">
        <thead>
          <tr>
            <ColumnHead>Source</ColumnHead>
            <ColumnHead className="w-[30%]">
              <span className="sr-only">Bar</span>
            </ColumnHead>
            <ColumnHead numeric unit="%">
              Share
            </ColumnHead>
          </tr>
        </thead>
        <tbody>
          {estimate.sources.map(({ source, share }) => (
            <tr key={source}>
              <td>{source}</td>
              <td aria-hidden="true">
                <span className="block h-1.5 bg-ink" style={{ width: `${share * 100}%` }} />
              </td>
              <td className="num">{(share * 100).toFixed(0)}</td>
            </tr>
          ))}
        </tbody>
      </DataTable>
      <p className="mt-3 text-small">
        Combined: <b>{estimate.combined}</b> of the rate, one standard uncertainty.
      </p>
    </div>
  );
}

/** The reported estimate among what other estimators say. */
export function EstimatorTable({
  rows,
  rateUnit,
  timeUnit,
}: {
  rows: readonly EstimatorRow[];
  rateUnit: string;
  timeUnit: string;
}) {
  if (rows.length < 2) return null;
  return (
    <section className="mt-7">
      <SectionTitle note="the reported one is marked">Estimators side by side</SectionTitle>
      <DataTable caption="Estimators side by side">
        <thead>
          <tr>
            <ColumnHead>Estimator</ColumnHead>
            <ColumnHead numeric unit={timeUnit}>
              Window
            </ColumnHead>
            <ColumnHead numeric unit={rateUnit}>
              Initial rate
            </ColumnHead>
          </tr>
        </thead>
        <tbody>
          {rows.map((row) => (
            <tr
              key={`${row.name} ${row.window} ${row.reported}`}
              className={row.reported ? "standing" : undefined}
            >
              <td>
                {typeset(row.name)}
                {row.reported && <span className="sr-only">, reported</span>}
              </td>
              <td className="num">{row.window}</td>
              <td className="num">
                <Value number={row.rate} setting="table" />
              </td>
            </tr>
          ))}
        </tbody>
      </DataTable>
    </section>
  );
}
