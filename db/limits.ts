/** How much a study and a group may hold, each with the sentence that says so and the way out. */
export const RUNS_PER_STUDY = 2_000;
export const SPECIES_PER_STUDY = 24;
export const STOCKS_PER_STUDY = 60;
export const STANDARDS_PER_STUDY = 120;
export const SCANS_PER_STUDY = 24;
export const POINTS_PER_STUDY = 5_000_000;
/** Raw files and traces of all studies of a group together. */
export const BYTES_PER_GROUP = 5 * 1024 ** 3;
export const BYTES_PER_FILE = 50 * 1024 ** 2;

/**
 * Sizes between which measured numbers lie in whatever unit, zero aside: far beyond any bench on both sides, and
 * their squares, powers and quotients stay far from where a double overflows or vanishes.
 */
export const MEASURED = { least: 1e-20, most: 1e20 } as const;

export function isMeasurable(value: number): boolean {
  const size = Math.abs(value);
  return size === 0 || (size >= MEASURED.least && size <= MEASURED.most);
}

export const limitSentences = {
  runs: (got: number) =>
    `A study holds at most ${grouped(RUNS_PER_STUDY)} runs and would have ${grouped(got)}. Put the rest into a second study.`,
  files: (got: number) =>
    `A study keeps at most ${grouped(RUNS_PER_STUDY)} files and would have ${grouped(got)}. Put the rest into a second study.`,
  species: (got: number) =>
    `A study has at most ${SPECIES_PER_STUDY} species and would have ${got}. Leave out those that neither react nor count for the ionic strength.`,
  stocks: (got: number) =>
    `A study has at most ${STOCKS_PER_STUDY} stocks and would have ${got}. Put the rest into a second study.`,
  standards: (got: number) =>
    `A study has at most ${STANDARDS_PER_STUDY} standards and would have ${got}. Enter replicates as readings of one standard.`,
  scans: (got: number) =>
    `A study has at most ${SCANS_PER_STUDY} scans and would have ${got}. Remove one that is no longer needed.`,
  points: (got: number) =>
    `A study holds at most ${grouped(POINTS_PER_STUDY)} points and would have ${grouped(got)}. Import every second or tenth reading, or put the rest into a second study.`,
  group: (got: number) =>
    `Your group keeps at most ${inMegabytes(BYTES_PER_GROUP)} and would have ${inMegabytes(got)}. Ask whoever runs this installation for more room.`,
  measured: (what: string, got: number) =>
    `${what} would be ${got}, which no measurement gives. Check the power of ten and the unit.`,
  /** \`got\` is null where the file was cut off at the limit and its length is not known. */
  file: (got: number | null) =>
    `The file has ${got === null ? "more" : inMegabytes(got)}; at most ${inMegabytes(BYTES_PER_FILE)} can be read. Split it, or leave out readings that are not needed.`,
} as const;

/** U+202F between groups of three digits. */
function grouped(count: number): string {
  return String(count).replace(/\B(?=(\d{3})+$)/g, "\u202f");
}

function inMegabytes(bytes: number): string {
  return `${grouped(Math.ceil(bytes / 1024 ** 2))}\u202fMB`;
}
