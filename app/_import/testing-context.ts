import type { StudyContext } from "./reading";

/** A study with species A and B, absorbance as its signal, and no run yet: what the reader's tests read files for. */
export const EMPTY_STUDY: StudyContext = {
  timeUnit: "s",
  signal: { kind: "calibrated", quantity: "absorbance", unit: "1" },
  species: [
    { id: "a", symbol: "A", name: "4-nitrophenyl acetate", unit: "mmol/L" },
    { id: "b", symbol: "B", name: "hydroxide", unit: "mmol/L" },
  ],
  runs: [],
  runRows: 0,
  points: 0,
};
