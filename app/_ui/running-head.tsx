import Link from "next/link";
import type { ReactNode } from "react";
import { BrandMark } from "./brand";

/**
 * Brand, where you are, and actions. `trail` ends with the page's own name (no href). `aside` is a quiet remark
 * ("Saved 10:42"), hidden on a phone. `initials` draws the signed-in person.
 */
export function RunningHead({
  home,
  trail = [],
  aside,
  actions,
  person,
}: {
  /** Where the brand leads; null on pages that are read without an account. */
  home: string | null;
  trail?: readonly { readonly name: string; readonly href?: string | undefined }[];
  aside?: ReactNode;
  actions?: ReactNode;
  person?: { readonly initials: string; readonly name: string } | undefined;
}) {
  const brand = (
    <>
      <BrandMark />
      <span>Ratewright</span>
    </>
  );
  return (
    <header className="running-head">
      <a className="skip-link" href="#main">
        Skip to the sheet
      </a>
      {home === null ? (
        <span className="brand">{brand}</span>
      ) : (
        <Link className="brand" href={home} aria-label="Ratewright">
          {brand}
        </Link>
      )}
      {trail.length > 0 && (
        <nav className="trail" aria-label="Where you are">
          {trail.map((step, position) => (
            <Step key={step.name} step={step} first={position === 0} />
          ))}
        </nav>
      )}
      <span className="flex-1" />
      {aside !== undefined && <span className="aside text-ink-3">{aside}</span>}
      {actions}
      {person !== undefined && (
        <span
          className="grid size-7 flex-none place-items-center rounded-full border border-ctl text-[12px] font-semibold"
          title={`Signed in as ${person.name}`}
        >
          {person.initials}
        </span>
      )}
    </header>
  );
}

function Step({ step, first }: { step: { name: string; href?: string | undefined }; first: boolean }) {
  return (
    <>
      {!first && <span aria-hidden="true">/</span>}
      {step.href === undefined ? <b>{step.name}</b> : <Link href={step.href}>{step.name}</Link>}
    </>
  );
}
