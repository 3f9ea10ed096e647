import type { Metadata } from "next";
import { cookies } from "next/headers";
import { notFound } from "next/navigation";
import { AddedVariableFigure } from "@/app/_figures/added-variable-figure";
import { TraceFigure } from "@/app/_figures/trace-figure";
import { BudgetTable, ConstantTable } from "@/app/_findings/constants";
import { traceFigureView } from "@/app/_findings/figures.view";
import { OrderList } from "@/app/_findings/orders";
import { PairTable } from "@/app/_findings/pairs";
import { rateLawView } from "@/app/_findings/rate-law.view";
import { database } from "@/app/_server/database";
import { drawnTraces } from "@/app/_server/drawn-traces";
import { CheckNote } from "@/app/_ui/check";
import { InventedBanner } from "@/app/_ui/invented-banner";
import { Constant, LawExpression } from "@/app/_ui/law";
import { PrintButton } from "@/app/_ui/print-button";
import { typeset } from "@/app/_ui/prose";
import { RunningHead } from "@/app/_ui/running-head";
import { SectionTitle } from "@/app/_ui/sheet";
import { THEME_COOKIE, themeOf } from "@/app/_ui/theme";
import { ThemeToggle } from "@/app/_ui/theme-toggle";
import { analyseStudy } from "@/app/_worksheet/analyse-study";
import { gatherNotes } from "@/app/_worksheet/checks/gather-notes";
import { presentRuns } from "@/app/_worksheet/present-runs";
import { standingLawView } from "@/app/_worksheet/standing-law.view";
import { SharedRuns } from "./_components/shared-runs";
import { openLink } from "./open-link";
import "./share.css";
import { sharedPageView } from "./view";

interface Props {
  params: Promise<{ token: string }>;
}

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const shared = await openLink((await params).token);
  return shared === undefined ? {} : { title: shared.name };
}

/** A study as whoever holds the link may read it: the law, its evidence and its data, without an account. */
export default async function SharedStudyPage({ params }: Props) {
  const { token } = await params;
  const shared = await openLink(token);
  if (shared === undefined) notFound();
  const { sheet } = shared;
  const db = database();
  const hashes = presentRuns(sheet).flatMap((run) => (run.trace === null ? [] : [run.trace.sha256]));
  const [analysis, traces, jar] = await Promise.all([
    analyseStudy(db, sheet),
    drawnTraces(db, hashes),
    cookies(),
  ]);
  const page = sharedPageView(shared, analysis);
  const standing = standingLawView(sheet, analysis, (station) => `#${station}`);
  const findings = rateLawView(sheet, analysis);
  const figure = traceFigureView(sheet, analysis, traces);
  const open = gatherNotes(analysis.checks, analysis.runs).filter(
    (check) => check.settled === null && check.severity !== "holds",
  );
  const law = standing.law;
  return (
    <>
      <RunningHead home={null} aside={page.asOf} actions={<PrintButton size="small" />} />
      {sheet.study.invented && <InventedBanner />}
      <main id="main" tabIndex={-1} className="shared-sheet">
        <article>
          <p className="text-caption text-ink-3">{page.overline}</p>
          <h1>{shared.name}</h1>
          <section className="shared-law" aria-label="Standing law">
            {law.status === "law" ? (
              <>
                <p>
                  <LawExpression law={law.expression} />
                </p>
                <p>
                  <Constant constant={law.constant} marked />
                </p>
              </>
            ) : (
              <p className="law">No law yet. {typeset(law.missing)}</p>
            )}
            {page.reaction !== "" && <p className="conditions">{page.reaction}</p>}
            <p className="conditions">{typeset(standing.conditions)}</p>
          </section>
          <p className="verdict">
            {typeset(findings.verdict.claim)} {typeset(findings.verdict.support)}
          </p>
          <div className="shared-pair" id="rate-law">
            <section>
              {findings.orders.length > 0 && <OrderList orders={findings.orders} note={findings.orderNote} />}
            </section>
            <section>
              <SectionTitle>What could still move this</SectionTitle>
              {open.length === 0 && <p>No check of the runs, their rates or the law speaks against it.</p>}
              {open.map((check) => (
                <CheckNote
                  key={`${check.code} ${check.message}`}
                  severity={check.severity}
                  message={check.message}
                />
              ))}
            </section>
          </div>
          {figure.traces.length > 0 && (
            <section id="runs">
              <SectionTitle>Traces</SectionTitle>
              <TraceFigure
                view={figure}
                width={880}
                height={410}
                number={1}
                label={`${figure.y.quantity} against time for ${figure.traces.length} runs`}
                caption="Dashes: a repeat. Dots: a run that was set aside."
              />
            </section>
          )}
          {findings.figures.length > 0 && (
            <div className="shared-pair">
              {findings.figures.map(({ speciesId, figure: view, caption, label }, index) => (
                <AddedVariableFigure
                  key={speciesId}
                  view={view}
                  label={label}
                  number={index + 2}
                  caption={typeset(caption)}
                />
              ))}
            </div>
          )}
          <section id="rates">
            <SectionTitle>Runs and initial rates</SectionTitle>
            <SharedRuns runs={page.runs} />
          </section>
          {findings.constants.length > 0 && (
            <div className="shared-pair">
              <ConstantTable rows={findings.constants} />
              {findings.budget !== null && <BudgetTable budget={findings.budget} />}
            </div>
          )}
          {findings.pairs.length > 0 && (
            <section>
              <PairTable rows={findings.pairs} />
            </section>
          )}
          <section>
            <SectionTitle>Method</SectionTitle>
            <p className="method">{typeset(page.method.join(" "))}</p>
          </section>
        </article>
        <aside aria-label="About this sheet">
          <h2>Evidence</h2>
          <dl>
            <dt>Runs</dt>
            <dd>{page.evidence}</dd>
            {standing.facts
              .filter((fact) => fact.label === "Weakest link" || fact.label === "Checks")
              .map((fact) => (
                <div key={fact.label}>
                  <dt>{fact.label}</dt>
                  <dd>
                    {typeset(fact.headline)}, {typeset(fact.detail)}
                  </dd>
                </div>
              ))}
          </dl>
          <h2>Take away</h2>
          <ul>
            <li>
              {/* Plain links: a download is not a page to prefetch. */}
              <a href={`/share/${token}/runs.csv`} download>
                Runs and rates, CSV
              </a>
            </li>
            <li>
              <a href={`/share/${token}/traces.csv`} download>
                All traces, CSV
              </a>
            </li>
          </ul>
          <h2>This link</h2>
          <p>{page.link}</p>
          <p className="mt-6 print:hidden">
            <ThemeToggle theme={themeOf(jar.get(THEME_COOKIE)?.value)} />
          </p>
        </aside>
      </main>
    </>
  );
}
