import type { Check } from "../analysis";

/** A check of the whole study, open. */
export function studyCheck(
  station: Check["station"],
  severity: Check["severity"],
  code: string,
  message: string,
): Check {
  return { code, severity, station, runId: null, message, settled: null };
}

/** "3.4 %", with as many digits as a reader can use. */
export function percent(part: number): string {
  const value = part * 100;
  const text = value >= 10 ? value.toFixed(0) : value >= 1 ? value.toFixed(1) : value.toFixed(2);
  return `${text} %`;
}
