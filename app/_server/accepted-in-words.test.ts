import { describe, expect, it } from "vitest";
import { z } from "zod";
import { acceptedInWords } from "./accepted-in-words";

const schema = z.object({
  rate: z.number(),
  order: z.union([z.number().max(5), z.literal("free")]).optional(),
  estimator: z.enum(["straight", "tangent"]).or(z.literal("auto")).optional(),
  degree: z.union([z.literal(2), z.literal(3)]).optional(),
  weights: z.array(z.number().gt(0)).min(1).max(2).optional(),
  label: z.string().max(3).optional(),
  concentrations: z.record(z.string().max(2), z.number()).optional(),
  end: z
    .discriminatedUnion("kind", [
      z.object({ kind: z.literal("zero") }),
      z.object({ kind: z.literal("known"), value: z.number() }),
    ])
    .optional(),
  level: z.number().lt(1, { error: "must be below 1, for example 0.95" }).optional(),
});

function faults(body: unknown): string[] {
  const parsed = schema.safeParse(body, { error: acceptedInWords });
  return (parsed.error?.issues ?? []).map(({ path, message }) => `${path.join(".")} ${message}`);
}

describe("a refusal says what is accepted and what was found", () => {
  it.each<[string, unknown, string]>([
    ["a field that is missing", {}, "rate is missing; it must be a number"],
    ["a text for a number", { rate: "3.2" }, "rate must be a number, and is the text “3.2”"],
    ["an empty cell", { rate: null }, "rate must be a number, and is empty (null)"],
    [
      "another type in a union",
      { rate: 1, order: "first" },
      "order must be a number or “free”, and is the text “first”",
    ],
    ["a value beyond a bound", { rate: 1, order: 9 }, "order must be 5 or less, and is 9"],
    [
      "nested alternatives",
      { rate: 1, estimator: "line" },
      "estimator must be “straight”, “tangent” or “auto”, and is the text “line”",
    ],
    ["a number that is not among some", { rate: 1, degree: 7 }, "degree must be 2 or 3, and is the number 7"],
    ["an entry of a list", { rate: 1, weights: [0] }, "weights.0 must be above 0, and is 0"],
    ["a list that is empty", { rate: 1, weights: [] }, "weights must hold at least 1 entry, and holds 0"],
    [
      "a list that is too long",
      { rate: 1, weights: [1, 1, 1] },
      "weights must hold at most 2 entries, and holds 3",
    ],
    [
      "a text that is too long",
      { rate: 1, label: "abcd" },
      "label must hold at most 3 characters, and holds 4",
    ],
    [
      "a kind that is none",
      { rate: 1, end: { kind: "blank" } },
      "end.kind must be “zero” or “known”, and is the text “blank”",
    ],
    ["no kind", { rate: 1, end: { value: 1 } }, "end.kind is missing; it must be “zero” or “known”"],
    [
      "not even an object",
      { rate: 1, end: 0.1 },
      "end must be an object with named fields, and is the number 0.1",
    ],
    [
      "a name",
      { rate: 1, concentrations: { ABC: 1 } },
      "concentrations.ABC cannot be used as a name; write another",
    ],
    ["what the schema says itself", { rate: 1, level: 95 }, "level must be below 1, for example 0.95"],
  ])("%s", (_, body, sentence) => {
    expect(faults(body)).toEqual([sentence]);
  });
});
