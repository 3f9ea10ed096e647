"use client";

import Link from "next/link";
import { useState } from "react";
import { Constant, LawExpression } from "./law";
import type { StandingLawView } from "./law-view";
import { typeset } from "./prose";

/**
 * The law at the head of every station: law, marked constant, conditions, and the four facts that could overturn it.
 * While a change is being worked out the old law stays and "refitting" replaces the conditions.
 */
export function StandingLaw({ view, refitting = false }: { view: StandingLawView; refitting?: boolean }) {
  const { law } = view;
  // Counted while drawing: the strip stays mounted across stations, and only a change of the law is worth a word.
  const [seen, setSeen] = useState({ changeKey: view.changeKey, changes: 0, announcement: "" });
  if (seen.changeKey !== view.changeKey) {
    setSeen({ changeKey: view.changeKey, changes: seen.changes + 1, announcement: view.announcement });
  }
  return (
    <section className="standing-law" aria-label="Standing law">
      <div className="say law">
        {law.status === "law" ? (
          <>
            <LawExpression law={law.expression} />
            <Constant key={seen.changes} constant={law.constant} marked wiping={seen.changes > 0} />
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
              <Link href={fact.href} className={fact.asLaw ? "law" : undefined}>
                {typeset(fact.headline)}
              </Link>
              <small>{typeset(fact.detail)}</small>
            </dd>
          </div>
        ))}
      </dl>
      <p className="sr-only" role="status">
        {seen.announcement}
      </p>
    </section>
  );
}
