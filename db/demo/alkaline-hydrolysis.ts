import { normalDraws } from "./random-draws";

/**
 * Invented readings for the demo study: alkaline hydrolysis of 4-nitrophenyl acetate, A + 2 B → P + …, followed by
 * the absorbance of 4-nitrophenolate near 400 nm. Nothing here was measured; the figures are chosen to look like a
 * careful afternoon at a spectrophotometer and come out of a seed.
 *
 * The truth behind them: d[A]/dt = −k[A][B], d[B]/dt = −2k[A][B], d[P]/dt = k[A][B]. With D = [B]₀ − 2[A]₀ and
 * r = ([A]₀/[B]₀)·e^(−kDt) this integrates to [A] = D·r/(1 − 2r), so [P] = [A]₀ − [A].
 */
export const TRUTH = {
  /** L mol⁻¹ s⁻¹ at 25.0 °C. */
  rateConstant: 11.8,
  /** Relative standard deviation of k from run to run: pipetting, temperature, mixing. */
  runScatter: 0.02,
  /** ε·l in L mol⁻¹. */
  perMolar: 17_930,
  /** Standard deviation and lag-one autocorrelation of one reading's noise, in absorbance. */
  noise: 0.0004,
  autocorrelation: 0.45,
  /** Blank of the cell, in absorbance: mean, and standard deviation from run to run. */
  blank: 0.012,
  blankScatter: 0.002,
  /** J mol⁻¹, for the run whose cell was warm. */
  activationEnergy: 48_000,
} as const;

export const SAMPLE_INTERVAL_SECONDS = 0.1;
export const DEAD_TIME_SECONDS = 0.8;

export interface DemoRun {
  readonly label: string;
  readonly esterMolar: number;
  readonly hydroxideMolar: number;
  readonly celsius: number;
  readonly lastSecond: number;
  readonly remark: string;
  readonly setAside: string | null;
}

function demoRun(
  label: string,
  [esterMicromolar, hydroxideMillimolar]: [number, number],
  celsius: number,
  lastSecond: number,
  { remark = "", setAside = null }: { remark?: string; setAside?: string | null } = {},
): DemoRun {
  return {
    label,
    esterMolar: esterMicromolar / 1e6,
    hydroxideMolar: hydroxideMillimolar / 1e3,
    celsius,
    lastSecond,
    remark,
    setAside,
  };
}

export const DEMO_RUNS: readonly DemoRun[] = [
  demoRun("R01", [50, 0.5], 25.0, 69.9),
  demoRun("R02", [50, 1], 25.0, 59.9),
  demoRun("R03", [50, 2], 25.0, 39.9),
  demoRun("R04", [50, 3], 25.0, 29.9),
  demoRun("R05", [50, 4], 25.1, 23.9),
  demoRun("R06", [20, 2], 25.1, 39.9),
  demoRun("R07", [35, 2], 25.0, 39.9, { setAside: "bubble at 6 s" }),
  demoRun("R08", [70, 2], 25.0, 39.9),
  demoRun("R09", [100, 2], 25.0, 39.9),
  demoRun("R10", [50, 2], 25.0, 39.9, { remark: "Repeats R03" }),
  demoRun("R11", [50, 1], 26.8, 59.9, { setAside: "cell 1.8 °C warm" }),
];

export interface DemoReadings {
  readonly label: string;
  readonly timeSeconds: readonly number[];
  /** Absorbance, as the instrument prints it: five decimals. */
  readonly absorbance: readonly number[];
}

const SEED = 20_260_314;

export function demoReadings(): DemoReadings[] {
  const draw = normalDraws(SEED);
  return DEMO_RUNS.map((run) => {
    const rateConstant =
      TRUTH.rateConstant * temperatureFactor(run.celsius) * Math.exp(TRUTH.runScatter * draw());
    const blank = TRUTH.blank + TRUTH.blankScatter * draw();
    const readings = Math.round((run.lastSecond - DEAD_TIME_SECONDS) / SAMPLE_INTERVAL_SECONDS) + 1;
    const timeSeconds = Array.from(
      { length: readings },
      (_, index) => Math.round(10 * (DEAD_TIME_SECONDS + index * SAMPLE_INTERVAL_SECONDS)) / 10,
    );
    const noise = autoregressive(draw);
    const absorbance = timeSeconds.map((time) => {
      const product = run.esterMolar - esterLeft(run, rateConstant, time);
      const reading = blank + TRUTH.perMolar * product + noise() + (run.label === "R07" ? bubble(time) : 0);
      return Math.round(reading * 1e5) / 1e5;
    });
    return { label: run.label, timeSeconds, absorbance };
  });
}

/** [A] in mol L⁻¹ after `time` seconds. */
export function esterLeft(
  run: Pick<DemoRun, "esterMolar" | "hydroxideMolar">,
  rateConstant: number,
  time: number,
): number {
  const excess = run.hydroxideMolar - 2 * run.esterMolar;
  const ratio = (run.esterMolar / run.hydroxideMolar) * Math.exp(-rateConstant * excess * time);
  return (excess * ratio) / (1 - 2 * ratio);
}

function temperatureFactor(celsius: number): number {
  const gasConstant = 8.314462618;
  return Math.exp((TRUTH.activationEnergy / gasConstant) * (1 / 298.15 - 1 / (celsius + 273.15)));
}

/** Noise whose neighbours resemble each other, of standard deviation `noise` from its first value on. */
function autoregressive(draw: () => number): () => number {
  const innovation = TRUTH.noise * Math.sqrt(1 - TRUTH.autocorrelation ** 2);
  let last: number | null = null;
  return () => {
    last = last === null ? TRUTH.noise * draw() : TRUTH.autocorrelation * last + innovation * draw();
    return last;
  };
}

/** A bubble enters the light path at 6 s and creeps out of it. */
function bubble(time: number): number {
  return time < 6 ? 0 : 0.045 * Math.exp(-(time - 6) / 40);
}

/** The readings as the file that was uploaded: one time column, one column a run, blank where a run had ended. */
export function demoCsv(): string {
  const runs = demoReadings();
  const longest = runs.reduce<readonly number[]>(
    (times, run) => (run.timeSeconds.length > times.length ? run.timeSeconds : times),
    [],
  );
  const lines = longest.map((time, index) =>
    [time.toFixed(1), ...runs.map((run) => run.absorbance[index]?.toFixed(5) ?? "")].join(","),
  );
  const header = ["time / s", ...runs.map((run) => run.label)].join(",");
  return `${["# Invented readings for demonstration: absorbance at 400 nm, 1.000 cm", header, ...lines].join("\r\n")}\r\n`;
}
