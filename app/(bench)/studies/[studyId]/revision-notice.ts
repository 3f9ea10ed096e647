/** The newest revision of a study, as an open page learns of it. */
export interface RevisionNotice {
  readonly revision: number;
  /** What was done, in one sentence. */
  readonly summary: string;
  /** By whoever asks, here or in another window. */
  readonly mine: boolean;
  /** Null for what the program did by itself. */
  readonly name: string | null;
}
