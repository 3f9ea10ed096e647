import { z } from "zod";
import { concentrationSignal, conditions, linearSignal, sheet } from "../sheet/sheet.schema";

/**
 * What the Set-up station decides, in internal units. Whether a study is invented is not decided there, nor what the
 * standards say of the signal.
 */
export const setUp = sheet.pick({ species: true, followedSpeciesId: true }).extend({
  study: sheet.shape.study.omit({ invented: true }),
  conditions: conditions.omit({
    activationEnergy: true,
    referenceIonicStrengthMolar: true,
    sampleIntervalSeconds: true,
  }),
  signal: z.discriminatedUnion("kind", [concentrationSignal, linearSignal]).nullable(),
});

export type SetUp = z.infer<typeof setUp>;
