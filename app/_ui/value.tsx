import type { PrintedNumber } from "./law-view";
import { NARROW_SPACE } from "./narrow-space";
import { Unit } from "./unit";

/**
 * A value with its uncertainty, power of ten and unit, never broken across lines: (2.86 ± 0.07) × 10⁻⁵ mol L⁻¹.
 * `setting` "table" closes ± and × with narrow spaces, "sentence" with no-break spaces.
 */
export function Value({
  number,
  unit,
  setting = "sentence",
}: {
  number: PrintedNumber;
  unit?: string | undefined;
  setting?: "sentence" | "table";
}) {
  const space = setting === "table" ? NARROW_SPACE : "\u00a0";
  const { value, uncertainty, power } = number;
  const pair = uncertainty === null ? value : `${value}${space}±${space}${uncertainty}`;
  const bracketed = power !== 0 && uncertainty !== null ? `(${pair})` : pair;
  return (
    <span className="whitespace-nowrap">
      {bracketed}
      {power !== 0 && (
        <>
          {`${space}×${space}10`}
          <sup>{String(power).replace("-", "−")}</sup>
        </>
      )}
      {unit !== undefined && unit !== "" && (
        <>
          {"\u00a0"}
          <Unit text={unit} />
        </>
      )}
    </span>
  );
}

/**
 * A number of a column that aligns on its decimal point: `integerDigits` and `fractionDigits` are the widest of the
 * column. `text` null is an absent value: an em space, never zero.
 */
export function AlignedNumber({
  text,
  integerDigits,
  fractionDigits,
}: {
  text: string | null;
  integerDigits: number;
  fractionDigits: number;
}) {
  if (text === null) return <span>{"\u2003"}</span>;
  const point = text.indexOf(".");
  const whole = point < 0 ? text : text.slice(0, point);
  const fraction = point < 0 ? "" : text.slice(point);
  return (
    <span className="aligned">
      <span style={{ minWidth: `${integerDigits}ch` }}>{whole}</span>
      <span style={{ minWidth: fractionDigits === 0 ? 0 : `${fractionDigits + 0.6}ch` }}>{fraction}</span>
    </span>
  );
}
