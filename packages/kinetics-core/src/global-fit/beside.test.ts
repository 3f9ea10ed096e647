import { describe, expect, it } from "vitest";
import { bootstrapGlobalFit } from "./bootstrap-global-fit";
import { fitGlobal } from "./fit-global";
import { profileGlobalFit } from "./profile-global-fit";
import { simulateStudy } from "./simulated-study";

const study = {
  runs: 12,
  points: 40,
  orders: { A: 1, B: 0.5 },
  rateConstant: 2,
  betweenRuns: 0.05,
  noise: 0.003,
  seed: 8,
};
const input = simulateStudy(study);

describe("beside the intervals of a global fit", () => {
  it("a bootstrap over runs gives standard errors of the same size", () => {
    const bootstrap = bootstrapGlobalFit(input, { seed: 1, last: 400 });
    const fit = fitGlobal(input);
    if (
      bootstrap.status !== "complete" ||
      bootstrap.intervals.status !== "intervals" ||
      fit.status !== "fitted"
    )
      throw new Error(bootstrap.status);
    expect(bootstrap.parameterNames).toEqual(["ln k", "A", "B", "scale"]);
    const ratio =
      (bootstrap.intervals.parameters[1]?.standardError ?? 0) / (fit.orders.A?.standardError ?? 1);
    expect(ratio).toBeGreaterThan(0.5);
    expect(ratio).toBeLessThan(2);
  });

  it("a replicate is the same alone, in a portion or after an interruption", () => {
    const whole = bootstrapGlobalFit(input, { seed: 3, last: 6 });
    let asked = 0;
    const begun = bootstrapGlobalFit(input, { seed: 3, last: 6, shouldStop: () => ++asked > 2 });
    if (whole.status !== "complete" || begun.status !== "stopped" || !("next" in begun))
      throw new Error(begun.status);
    const rest = bootstrapGlobalFit(input, { seed: 3, first: begun.next, last: 6 });
    if (rest.status !== "complete") throw new Error(rest.status);
    expect([...begun.replicates, ...rest.replicates]).toEqual(whole.replicates);
  });

  it("a bootstrap says how far it has come", () => {
    const parts: number[] = [];
    const bootstrap = bootstrapGlobalFit(input, {
      seed: 1,
      last: 2,
      onProgress: (done, of) => parts.push(done / of),
    });
    expect(bootstrap.status).toBe("complete");
    expect(parts).toEqual([0.5, 1]);
  });

  it("a bootstrap of few runs is refused by name", () => {
    expect(bootstrapGlobalFit(simulateStudy({ ...study, runs: 6 }), { seed: 1, last: 10 }).status).toBe(
      "too-few-runs",
    );
  });

  it.each([
    ["with scatter between runs", input],
    [
      "where the runs show none, so that their weights rest on the noise",
      simulateStudy({ ...study, betweenRuns: 0 }),
    ],
  ])("a profile is the interval of the model where the problem is nearly linear, %s", (_, given) => {
    const fit = fitGlobal(given);
    const profile = profileGlobalFit(given, "B");
    if (profile.status !== "profiled" || fit.status !== "fitted") throw new Error(profile.status);
    const [low, high] = fit.orders.B?.interval ?? [0, 0];
    expect(Math.abs((profile.lower ?? 0) - low)).toBeLessThan(0.1 * (high - low));
    expect(Math.abs((profile.upper ?? 0) - high)).toBeLessThan(0.1 * (high - low));
  });

  it("a profile of what is not fitted is refused by name", () => {
    expect(profileGlobalFit(input, "C")).toMatchObject({ status: "bad-input", path: "name" });
  });
});
