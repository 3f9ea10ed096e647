/**
 * An order as people type it: empty or "free" sets it free; "1", "0.5", "0,5", "½", "1½", "3/2", "−1" hold it.
 * Returns undefined for anything else.
 */
export function readTypedOrder(typed: string): number | null | undefined {
  const text = typed.trim().toLowerCase().replace("\u2212", "-").replace(",", ".");
  if (text === "" || text === "free") return null;
  const match = /^(-?)(?:(\d+(?:\.\d+)?)(?:\/(\d+))?|(\d*)½)$/.exec(text);
  if (match === null) return undefined;
  const [, sign, number, divisor, whole] = match;
  const size =
    number === undefined
      ? Number(whole === "" ? 0 : whole) + 0.5
      : Number(number) / (divisor === undefined ? 1 : Number(divisor));
  if (!Number.isFinite(size)) return undefined;
  return sign === "-" ? -size : size;
}
