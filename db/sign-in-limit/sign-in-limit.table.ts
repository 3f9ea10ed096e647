/** Filled by the rate limiter on its own connection; the columns are the ones it demands. */
export interface SignInLimitTable {
  key: string;
  points: number;
  expire: number | null;
}
