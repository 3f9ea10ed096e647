import { describe, expect, it } from "vitest";
import { fitGlobal } from "./fit-global";
import type { GlobalFitInput } from "./global-fit";
import { robustBeside } from "./robust-beside";
import { simulateStudy } from "./simulated-study";

const study = {
  runs: 9,
  points: 40,
  orders: { A: 1, B: 0.5 },
  rateConstant: 2,
  betweenRuns: 0.05,
  noise: 0.003,
};

function besideOf(input: GlobalFitInput) {
  const fit = fitGlobal(input);
  if (fit.status !== "fitted") throw new Error(fit.message);
  return robustBeside(fit);
}

/** The same study with A under another name. */
function renamed(input: GlobalFitInput, name: string): GlobalFitInput {
  return {
    ...input,
    species: input.species.map((one) => (one.name === "A" ? { ...one, name } : one)),
    followed: name,
    law: { orders: { [name]: "free", B: "free" } },
    runs: input.runs.map((run) => ({
      ...run,
      concentrations: { [name]: run.concentrations.A ?? 0, B: run.concentrations.B ?? 0 },
    })),
  };
}

describe("cluster-robust errors beside a global fit", () => {
  it("belong to the species even where one bears the name of another parameter", () => {
    const input = simulateStudy({ ...study, seed: 8 });
    const expected = besideOf(input).parameters.A;
    expect(expected?.standardError).toBeGreaterThan(0);
    for (const name of ["scale", "ln k"]) {
      expect(besideOf(renamed(input, name)).parameters[name]).toEqual(expected);
    }
  });

  it("speak of orders and of the signal per concentration, where they are wider", () => {
    const messages = [1, 2, 3, 4, 5, 6, 7, 8].flatMap((seed) =>
      besideOf(simulateStudy({ ...study, seed })).flags.map(({ message }) => message),
    );
    expect(messages.length).toBeGreaterThan(0);
    for (const message of messages) {
      expect(message).toMatch(/^The interval of (ln k|the order in [AB]|the signal per concentration) is /);
    }
  });
});
