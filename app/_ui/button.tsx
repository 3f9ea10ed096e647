import Link from "next/link";
import type { ComponentProps } from "react";

type Look = { kind?: "primary" | "plain" | "text"; size?: "normal" | "small" };

function lookOf({ kind = "plain", size = "normal" }: Look): string {
  if (kind === "text") return "text-button";
  return ["button", kind === "primary" ? "primary" : "", size === "small" ? "small" : ""]
    .filter(Boolean)
    .join(" ");
}

/** A verb with its object ("Set R11 aside"). `kind` "text" is an underlined link that acts. Default type "button". */
export function Button({
  kind,
  size,
  className = "",
  type = "button",
  ...rest
}: ComponentProps<"button"> & Look) {
  return <button type={type} className={`${lookOf({ kind, size })} ${className}`.trim()} {...rest} />;
}

/** The same look on a link to another page. */
export function ButtonLink({ kind, size, className = "", ...rest }: ComponentProps<typeof Link> & Look) {
  return <Link className={`${lookOf({ kind, size })} ${className}`.trim()} {...rest} />;
}
