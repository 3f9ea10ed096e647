import { z } from "zod";
import { concentrationSignal, conditions, linearSignal, sheet, uncertain } from "../sheet/sheet.schema";

/**
 * What the Set-up station decides, in internal units. Whether a study is invented is not decided there, nor whether
 * the standards give the signal.
 */
export const setUp = sheet.pick({ species: true, followedSpeciesId: true }).extend({
  study: sheet.shape.study.omit({ invented: true }),
  conditions: conditions.omit({ referenceIonicStrengthMolar: true }),
  signal: z
    .discriminatedUnion("kind", [concentrationSignal, linearSignal.extend({ blank: uncertain.nullable() })])
    .nullable(),
});

export type SetUp = z.infer<typeof setUp>;
