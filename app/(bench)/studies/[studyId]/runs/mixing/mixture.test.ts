import { describe, expect, it } from "vitest";
import { mixturesOf } from "../_mixing/mixture";
import { mixedSheet, NO_ANALYSIS } from "../_mixing/testing-mixtures";
import { mixingGridView } from "./mixing-grid.view";
import { typedMixture, typedWords } from "./typed-mixture";

describe("what a row of volumes comes to", () => {
  const sheet = mixedSheet();
  const [base, over] = mixturesOf(sheet, sheet.runs);

  it("is printed led by its uncertainty, with total and ionic strength", () => {
    // [A] = 10 mmol/L · 15/3000; u: stock 0.5 %, delivery 0.08/15 = 0.53 %, mark 0.5 %, in squares 0.89 %.
    expect(base).toEqual({
      status: "mixed",
      total: "3000",
      concentrations: { A: "0.0500 ± 0.0004", B: "2.000 ± 0.019" },
      ionicStrength: "5.00 × 10⁻⁵",
    });
  });

  it("says where solvent makes up the rest, and nothing of a row without volumes", () => {
    const [short, empty] = mixturesOf(sheet, [
      { label: "R03", volumes: { a: 15, b: 300 }, markMicrolitre: null },
      { label: "R03", volumes: {}, markMicrolitre: null },
    ]);
    expect(short).toMatchObject({ status: "mixed", total: "315 to 3000" });
    expect(empty).toEqual({ status: "empty" });
  });

  it("is refused above the mark by name and amount, with what would repair it", () => {
    expect(over).toEqual({
      status: "refused",
      total: "3294",
      refusal: {
        title: "R02 adds to 3294 µL, 294 over the mark of 3000",
        detail: "That is the volume of stock B: water may have been worked out without it.",
        columns: ["total", "v:w"],
        repairs: [
          { label: "Set water to 2700", columnId: "v:w", text: "2700" },
          { label: "Make the mark 3294", columnId: "mark", text: "3294" },
        ],
      },
    });
  });

  it("offers the mark alone where no medium is large enough", () => {
    const [full] = mixturesOf(sheet, [
      { label: "R09", volumes: { a: 2000, b: 2000, w: 100 }, markMicrolitre: null },
    ]);
    if (full?.status !== "refused") throw new Error("refused");
    expect(full.refusal.repairs.map(({ label }) => label)).toEqual(["Make the mark 4100"]);
    expect(full.refusal.detail).toBe("");
  });
});

describe("a row while it is typed", () => {
  const view = mixingGridView(mixedSheet(), NO_ANALYSIS);
  const cells = view.rows[0]?.cells ?? {};

  it("speaks the result, the refusal or the fault", () => {
    expect(typedWords(view, cells, "v:b", "600")).toBe("R01 adds to 3300 µL, 300 over the mark of 3000.");
    expect(typedWords(view, cells, "v:b", "150,0")).toBe(
      "150,0 µL gives [A]₀ 0.0500 ± 0.0004 mmol L⁻¹, [B]₀ 1.000 ± 0.009 mmol L⁻¹, 2850 to 3000 µL in all.",
    );
    expect(typedWords(view, cells, "v:b", "x")).toContain("is not a number");
    expect(typedWords(view, cells, "remark", "cold")).toBe("cold.");
  });

  it("is nothing while a volume is not read", () => {
    expect(typedMixture(view, { ...cells, "v:b": "x" })).toBeNull();
  });
});
