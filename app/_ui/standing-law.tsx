"use client";

import Link from "next/link";
import { Constant, LawExpression } from "./law";
import type { StandingLawView } from "./law-view";
import { typeset } from "./prose";

/**
 * The law at the head of every station: law, marked constant, conditions, and the four facts that could overturn it.
 * While a change is being worked out the old law stays and "refitting" replaces the conditions.
 */
export function StandingLaw({ view, refitting = false }: { view: StandingLawView; refitting?: boolean }) {
  const { law } = view;
  return (
    <section className="standing-law" aria-label="Standing law">
      <div className="say law">
        {law.status === "law" ? (
          <>
            <LawExpression law={law.expression} />
            <span key={view.changeKey} className="wiped-frame">
              <Constant constant={law.constant} marked />
            </span>
          </>
        ) : (
          <span>No law yet. {typeset(law.missing)}</span>
        )}
        <span className="conditions">
          {refitting ? (
            "Refitting."
          ) : (
            <>
              {law.status === "law" && <b>Standing law. </b>}
              {typeset(view.conditions)}
            </>
          )}
        </span>
      </div>
      <dl className="facts">
        {view.facts.map((fact) => (
          <div key={fact.label}>
            <dt>{fact.label}</dt>
            <dd>
              <Link href={fact.href}>{typeset(fact.headline)}</Link>
              <small>{typeset(fact.detail)}</small>
            </dd>
          </div>
        ))}
      </dl>
      <p className="sr-only" role="status">
        {view.announcement}
      </p>
    </section>
  );
}
