"use client";

import Link from "next/link";
import { usePathname } from "next/navigation";
import { useEffect, useRef } from "react";
import { SeverityShape } from "./check";
import type { StationState, StationView } from "./law-view";
import { typeset } from "./prose";

/** The stations of a study with what each yields, so that the rail reads as the derivation in miniature. */
export function StationRail({ stations }: { stations: readonly StationView[] }) {
  const pathname = usePathname();
  const rail = useRef<HTMLElement>(null);
  const here = stations.find((station) => isOrIsUnder(pathname, station.href))?.href;
  // On a phone the rail scrolls sideways; it opens at the current station.
  useEffect(() => {
    const nav = rail.current;
    const link = [...(nav?.querySelectorAll("a") ?? [])].find((one) => one.getAttribute("href") === here);
    if (nav && link && nav.scrollWidth > nav.clientWidth) {
      nav.scrollLeft += link.getBoundingClientRect().left - nav.getBoundingClientRect().left - 16;
    }
  }, [here]);
  return (
    <nav ref={rail} className="station-rail" aria-label="Stations of this study">
      <ol>
        {stations.map((station) => (
          <li key={station.href}>
            <Link href={station.href} aria-current={station.href === here ? "page" : undefined}>
              <span className="name">
                <StateMark state={station.state} />
                <span>{station.name}</span>
              </span>
              <span className="yield">{typeset(station.yield)}</span>
            </Link>
          </li>
        ))}
      </ol>
    </nav>
  );
}

function isOrIsUnder(pathname: string, href: string): boolean {
  return pathname === href || pathname.startsWith(`${href}/`);
}

const TONE = { holds: "text-ok", weakens: "text-warn", blocks: "text-stop" } as const;
const SPOKEN = { holds: "holds", weakens: "weakened", blocks: "blocked", open: "open", log: "log" } as const;

function StateMark({ state }: { state: StationState }) {
  return (
    <>
      {state === "open" || state === "log" ? (
        <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden="true" className="text-ctl">
          {state === "open" ? (
            <circle
              cx="6"
              cy="6"
              r="4.6"
              fill="none"
              stroke="currentColor"
              strokeWidth="1.4"
              strokeDasharray="2.2 1.6"
            />
          ) : (
            <path d="M1 2.5h10M1 6h10M1 9.5h6" stroke="currentColor" strokeWidth="1.4" />
          )}
        </svg>
      ) : (
        <span className={`inline-flex ${TONE[state]}`}>
          <SeverityShape severity={state} size={12} />
        </span>
      )}
      <span className="sr-only">{SPOKEN[state]}: </span>
    </>
  );
}
