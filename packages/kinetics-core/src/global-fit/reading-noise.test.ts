import { randomDraws } from "kinetics-core/random";
import { describe, expect, it } from "vitest";
import { ownAutocorrelation, readingNoise } from "./reading-noise";
import { runLinearisations } from "./run-linearisation";

/** Autoregressive residuals of runs from which a constant and a straight line have been taken. */
function runs(count: number, points: number, rho: number) {
  const draws = randomDraws(5);
  const made = runLinearisations(
    Array.from({ length: count }, () => points),
    1,
    0,
  );
  let squares = 0;
  for (const run of made) {
    let error = draws.normal();
    const errors = Array.from({ length: points }, () => {
      error = rho * error + Math.sqrt(1 - rho * rho) * draws.normal();
      return error;
    });
    const centred = withoutLine(errors);
    const variance = centred.reduce((sum, r) => sum + r * r, 0);
    run.lagOne = centred.slice(1).reduce((sum, r, i) => sum + r * (centred[i] ?? 0), 0) / variance;
    squares += variance;
  }
  return { made, squares };
}

function withoutLine(values: readonly number[]): number[] {
  const n = values.length;
  const mean = values.reduce((sum, value) => sum + value, 0) / n;
  const middle = (n - 1) / 2;
  const slope = values.reduce((sum, value, i) => sum + value * (i - middle), 0) / ((n * (n * n - 1)) / 12);
  return values.map((value, i) => value - mean - slope * (i - middle));
}

describe("the noise of the readings", () => {
  it.each([
    [0, 60],
    [0.5, 40],
    [0.8, 60],
    [0.8, 400],
    [0.9, 200],
  ])("finds an autocorrelation of %d and the variance from short traces of %d readings", (rho, points) => {
    const { made, squares } = runs(40, points, rho);
    const noise = readingNoise(made, 0);
    const together = noise.reduce((sum, one) => sum + one.autocorrelation, 0) / 40;
    const variance = squares / noise.reduce((sum, one) => sum + one.freedom, 0);
    expect(Math.abs(together - rho)).toBeLessThan(0.06);
    expect(variance).toBeGreaterThan(0.85);
    expect(variance).toBeLessThan(1.15);
  });

  it("lets a run that lies far above the others keep its own", () => {
    const { made } = runs(12, 100, 0);
    const odd = made[3];
    if (odd !== undefined) odd.lagOne = 0.9;
    const noise = readingNoise(made, 2);
    expect(noise[3]?.autocorrelation).toBeGreaterThan(0.7);
    expect(noise[4]?.autocorrelation).toBeLessThan(0.3);
    expect(odd === undefined ? 0 : ownAutocorrelation(odd)).toBeGreaterThan(0.88);
  });
});
