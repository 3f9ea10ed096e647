import { printUncertain } from "kinetics-core/quantities";

/** Widths of the widest number of a column, so that its numbers align on the decimal point. */
export interface PrintedColumn {
  readonly integerDigits: number;
  readonly fractionDigits: number;
}

export interface ColumnNumber {
  readonly value: number;
  readonly uncertainty: number | null;
}

export interface ColumnText {
  readonly value: string;
  readonly uncertainty: string | null;
}

/** Numbers of one column, each led by its own uncertainty, with one power of ten for the column's head. */
export function columnOf(numbers: readonly (ColumnNumber | null)[]): {
  readonly power: number;
  readonly printed: readonly (ColumnText | null)[];
  readonly column: PrintedColumn;
} {
  const largest = Math.max(0, ...numbers.map((one) => Math.abs(one?.value ?? 0)));
  const power = largest === 0 ? 0 : printUncertain(largest, null).power;
  const printed = numbers.map((one) =>
    one === null ? null : printUncertain(one.value, one.uncertainty, { digits: 2, power }),
  );
  const parts = printed.flatMap((one) => (one === null ? [] : [one.value.split(".")]));
  return {
    power,
    printed,
    column: {
      integerDigits: Math.max(1, ...parts.map(([whole]) => whole?.length ?? 1)),
      fractionDigits: Math.max(0, ...parts.map(([, fraction]) => fraction?.length ?? 0)),
    },
  };
}
