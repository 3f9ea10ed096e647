/** Why a text is no rate law, and where: a caret belongs under `length` characters from `position` on. */
export interface ExpressionFault {
  readonly status: "not-an-expression";
  readonly code: ExpressionFaultCode;
  /** In UTF-16 code units of the text as given. */
  readonly position: number;
  /** At least 1; past the end of the text where something is missing there. */
  readonly length: number;
  /** One sentence on what was found, one on the way out. */
  readonly message: string;
}

export type ExpressionFaultCode =
  | "empty"
  | "too-long"
  | "too-deep"
  | "too-many-steps"
  | "too-many-names"
  | "name-too-long"
  | "unknown-character"
  | "decimal-comma"
  | "number-out-of-range"
  | "equals-sign"
  | "bracket-not-closed"
  | "bracket-not-opened"
  | "species-unknown"
  | "function-unknown"
  | "function-without-argument"
  | "something-missing"
  | "unclear-product"
  | "unclear-division"
  | "constant-without-value"
  | "rate-constant-not-a-factor";

export interface Span {
  readonly position: number;
  readonly length: number;
}

export function faultAt(
  code: ExpressionFaultCode,
  { position, length }: Span,
  message: string,
): ExpressionFault {
  return { status: "not-an-expression", code, position, length: Math.max(1, length), message };
}

const LONGEST_QUOTATION = 24;

/** A piece of the user's text as a message may carry it: short, and with nothing invisible in it. */
export function quoted(text: string): string {
  const visible = text.replace(/[\p{C}\p{Zl}\p{Zp}]/gu, "\uFFFD");
  const letters = [...visible];
  return letters.length > LONGEST_QUOTATION
    ? `“${letters.slice(0, LONGEST_QUOTATION).join("")}…”`
    : `“${visible}”`;
}
