import { describe, expect, it } from "vitest";
import { lookOfMark } from "./mark-look";

const forms = (levels: number) =>
  Array.from(
    { length: levels },
    (_, level) => lookOfMark({ series: "first", level, levels, repeat: false }).form,
  );

describe("lookOfMark", () => {
  it("gives four, six and eight levels their own forms, lowest to highest", () => {
    expect(forms(4)).toEqual(["triangle-down", "diamond", "square", "triangle-up"]);
    expect(forms(5).toSpliced(2, 1)).toEqual(forms(4));
    expect(forms(6)).toEqual(["triangle-down", "bowtie", "diamond", "square", "cross", "triangle-up"]);
    expect(new Set(forms(8)).size).toBe(8);
  });

  it("never gives two of up to eight levels the same form", () => {
    for (let levels = 2; levels <= 8; levels += 1) expect(new Set(forms(levels)).size).toBe(levels);
  });

  it("fills the first reagent, opens the second, dots the third, rings the base recipe", () => {
    const at = (series: "base" | "first" | "second" | "third") =>
      lookOfMark({ series, level: 0, levels: 4, repeat: false });
    expect(at("first").fill).toBe("solid");
    expect(at("second").fill).toBe("open");
    expect(at("third").fill).toBe("open-dot");
    expect(at("base").form).toBe("ring");
  });

  it("raises contrast with the level: four levels take the ramp's ends and leave its middle to the base recipe", () => {
    const colours = [0, 1, 2, 3].map(
      (level) => lookOfMark({ series: "first", level, levels: 4, repeat: false }).colour,
    );
    expect(colours).toEqual(["var(--cool-1)", "var(--cool-2)", "var(--cool-4)", "var(--cool-5)"]);
  });

  it("is grey and open for a run set aside, whatever its series", () => {
    const look = lookOfMark({ series: "second", level: 2, levels: 4, repeat: false }, true);
    expect(look).toEqual({ form: "diamond", fill: "open", colour: "var(--ink-3)" });
  });
});
