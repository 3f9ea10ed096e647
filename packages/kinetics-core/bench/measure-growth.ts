import { median } from "kinetics-core/summation";
import { benchmarkStudy } from "./benchmark-study";
import { fitOrThrow, inputOf } from "./our-fit";
import { leastTimeOf } from "./stopwatch";

/** Cost a run at ten times as many runs, and a point at ten times as many points, over that of the study itself. */
export interface Growth {
  readonly runs: number;
  readonly points: number;
}

const ROUNDS = 7;
const REPEATS = 3;
/** Fits take four to six passes by the luck of their noise; several studies of each size even that out. */
const STUDIES = 6;
const RUNS = 12;
const READINGS = 1000;
const TIMES = 10;

export function measureGrowth(progress: (message: string) => void): Growth {
  // The plain studies are fitted ten times, so that all take about as long and meet interruptions alike.
  const plain = fitsOf(RUNS, READINGS, TIMES);
  const moreRuns = fitsOf(TIMES * RUNS, READINGS, 1);
  const morePoints = fitsOf(RUNS, TIMES * READINGS, 1);
  for (let i = 0; i < 3; i++) for (const fits of [plain, moreRuns, morePoints]) fits();
  const rounds = Array.from({ length: ROUNDS }, (_, round) => {
    progress(`growth, round ${round + 1} of ${ROUNDS}`);
    const base = leastTimeOf(REPEATS, plain);
    return { runs: leastTimeOf(REPEATS, moreRuns) / base, points: leastTimeOf(REPEATS, morePoints) / base };
  });
  return {
    runs: median(rounds.map(({ runs }) => runs)),
    points: median(rounds.map(({ points }) => points)),
  };
}

function fitsOf(runs: number, readings: number, times: number): () => void {
  const inputs = Array.from({ length: STUDIES }, (_, i) => inputOf(benchmarkStudy(runs, readings, 101 + i)));
  return () => {
    for (let i = 0; i < times; i++) for (const input of inputs) fitOrThrow(input);
  };
}
