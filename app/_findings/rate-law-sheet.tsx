import type { ReactNode } from "react";
import { AddedVariableFigure } from "@/app/_figures/added-variable-figure";
import { ResidualFigure } from "@/app/_figures/residual-figure";
import { ButtonLink } from "@/app/_ui/button";
import { CheckNote } from "@/app/_ui/check";
import { EmptyState } from "@/app/_ui/empty-state";
import { Margin, MarginSection } from "@/app/_ui/margin";
import { typeset } from "@/app/_ui/prose";
import { SectionTitle, Sheet } from "@/app/_ui/sheet";
import { BudgetTable, ConstantTable } from "./constants";
import { InfluenceTable } from "./influence";
import { OrderList } from "./orders";
import { PairTable } from "./pairs";
import type { RateLawView } from "./rate-law.view";

/** The Rate law station as it is drawn for whoever reads it; `orderForm` is null for readers. */
export function RateLawSheet({
  view,
  orderForm,
  runsAddress,
}: {
  view: RateLawView;
  orderForm: ReactNode;
  /** Where runs are to be added; null where the reader cannot. */
  runsAddress: string | null;
}) {
  return (
    <Sheet
      title="Rate law"
      verdict={
        <>
          <span className="marked">{typeset(view.verdict.claim)}</span> {typeset(view.verdict.support)}
        </>
      }
      margin={
        <Margin label="Checks on the law">
          <MarginSection title="Checks on the law">
            {view.checks.length === 0 && <p className="text-ink-2">Nothing to check yet.</p>}
            {view.checks.map((check) => (
              <CheckNote
                key={`${check.code} ${check.message}`}
                severity={check.severity}
                message={check.message}
                settled={check.settled}
              />
            ))}
          </MarginSection>
          {view.influence !== null && <InfluenceTable influence={view.influence} />}
        </Margin>
      }
    >
      {view.orders.length === 0 ? (
        <EmptyState
          title="No law yet"
          actions={
            runsAddress === null ? undefined : (
              <ButtonLink kind="primary" href={runsAddress}>
                Go to the runs
              </ButtonLink>
            )
          }
        >
          {typeset(view.verdict.support)}
        </EmptyState>
      ) : (
        <Findings view={view} orderForm={orderForm} />
      )}
    </Sheet>
  );
}

function Findings({ view, orderForm }: { view: RateLawView; orderForm: ReactNode }) {
  return (
    <>
      <div className="grid grid-cols-[minmax(0,.92fr)_minmax(0,2fr)] gap-x-7 gap-y-6 narrow:grid-cols-1">
        <div className="narrow:grid narrow:grid-cols-2 narrow:gap-x-8 phone:grid-cols-1">
          <OrderList orders={view.orders} note={view.orderNote} />
          <div>
            {view.undetermined.map((message) => (
              <p key={message} className="mt-2 text-small">
                {typeset(message)}
              </p>
            ))}
            {orderForm}
          </div>
        </div>
        <div className="grid grid-cols-2 gap-x-7 gap-y-6 phone:grid-cols-1">
          {view.figures.map(({ speciesId, figure, caption, label }, index) => (
            <AddedVariableFigure
              key={speciesId}
              view={figure}
              label={label}
              number={index + 1}
              caption={typeset(caption)}
            />
          ))}
        </div>
      </div>
      {view.constants.length > 0 && (
        <div className="mt-7 grid grid-cols-[minmax(0,1.25fr)_minmax(0,1fr)] items-start gap-x-9 gap-y-6 phone:grid-cols-1">
          <ConstantTable rows={view.constants} />
          {view.budget !== null && <BudgetTable budget={view.budget} />}
        </div>
      )}
      <div className="mt-7 grid grid-cols-[minmax(0,1.25fr)_minmax(0,1fr)] items-start gap-x-9 gap-y-6 phone:grid-cols-1">
        {view.residuals !== null && (
          <div>
            <SectionTitle note="percent of the rate">Residuals by run</SectionTitle>
            <ResidualFigure
              view={view.residuals}
              label="Residuals by run, percent of the rate"
              number={view.figures.length + 1}
              caption={typeset(view.residualNote)}
              width={560}
              height={200}
            />
          </div>
        )}
        {view.pairs.length > 0 && <PairTable rows={view.pairs} />}
      </div>
    </>
  );
}
