import { renderToStaticMarkup } from "react-dom/server";
import { describe, expect, it } from "vitest";
import { Formula } from "./formula";
import { Constant, LawExpression, spokenLaw } from "./law";
import { Prose } from "./prose";
import { Unit } from "./unit";
import { AlignedNumber, Value } from "./value";

const text = (markup: string) => markup.replaceAll(/<[^>]+>/g, "");

describe("Prose", () => {
  it("raises powers with a true minus, lowers indices of slanted letters, slants variables", () => {
    expect(renderToStaticMarkup(<Prose text="*k*_0 = 3 × 10^-3 s^-1" />)).toBe(
      "<i>k</i><sub>0</sub>\u00a0=\u00a03\u00a0×\u00a010<sup>−3</sup>\u2005s<sup>−1</sup>",
    );
  });

  it("keeps a value with its unit, its sign and its uncertainty on one line, and nothing else", () => {
    const set = (prose: string) => text(renderToStaticMarkup(<Prose text={prose} />));
    expect(set("at 25.0 °C, 12 % of 50.0 µmol L^-1")).toBe(
      "at 25.0\u00a0°C, 12\u00a0% of 50.0\u00a0µmol\u2005L−1",
    );
    expect(set("*k* = 11.8 ± 0.3 L mol^-1 s^-1")).toBe(
      "k\u00a0=\u00a011.8\u00a0±\u00a00.3\u00a0L\u2005mol−1\u2005s−1",
    );
    expect(set("9 runs set aside by 2 members")).toBe("9 runs set aside by 2 members");
  });

  it("leaves underscores of names alone", () => {
    expect(renderToStaticMarkup(<Prose text="run_14 of trace_2.csv" />)).toBe("run_14 of trace_2.csv");
  });

  it("draws the reversible arrow, which no family has", () => {
    const markup = renderToStaticMarkup(<Prose text="A ⇌ B" />);
    expect(markup).not.toContain("⇌");
    expect(markup).toContain('aria-label="in equilibrium with"');
  });

  it("escapes what a person typed", () => {
    expect(renderToStaticMarkup(<Prose text="<b>*k*</b>" />)).toBe("&lt;b&gt;<i>k</i>&lt;/b&gt;");
  });
});

describe("Unit", () => {
  it("never breaks and parts its factors by a narrow space", () => {
    expect(renderToStaticMarkup(<Unit text="L mol^-1 s^-1" />)).toBe(
      '<span class="whitespace-nowrap">L\u2005mol<sup>−1</sup>\u2005s<sup>−1</sup></span>',
    );
  });

  it("raises half orders", () => {
    expect(text(renderToStaticMarkup(<Unit text="L^0.5 mol^-0.5 s^-1" />))).toBe(
      "L0.5\u2005mol−0.5\u2005s−1",
    );
  });
});

describe("Value", () => {
  it("brackets a pair before its power of ten", () => {
    const markup = renderToStaticMarkup(
      <Value number={{ value: "2.86", uncertainty: "0.07", power: -5 }} unit="s^-1" />,
    );
    expect(text(markup)).toBe("(2.86\u00a0±\u00a00.07)\u00a0×\u00a010−5\u00a0s−1");
  });

  it("closes the sign with narrow spaces in a table", () => {
    const markup = renderToStaticMarkup(
      <Value number={{ value: "1.182", uncertainty: "0.018", power: 0 }} setting="table" />,
    );
    expect(text(markup)).toBe("1.182\u2005±\u20050.018");
  });

  it("prints a value alone where its uncertainty is unknown", () => {
    expect(text(renderToStaticMarkup(<Value number={{ value: "12", uncertainty: null, power: 0 }} />))).toBe(
      "12",
    );
  });
});

describe("AlignedNumber", () => {
  it("splits at the point, with room for the column's widest", () => {
    expect(renderToStaticMarkup(<AlignedNumber text="−4.07" integerDigits={3} fractionDigits={2} />)).toBe(
      '<span class="aligned"><span style="min-width:3ch">−4</span><span style="min-width:2.6ch">.07</span></span>',
    );
  });

  it("leaves an em space for an absent value, never a zero", () => {
    expect(
      text(renderToStaticMarkup(<AlignedNumber text={null} integerDigits={3} fractionDigits={2} />)),
    ).toBe("\u2003");
  });
});

describe("Formula", () => {
  it.each([
    ["CH3CO2C6H4NO2", "CH<sub>3</sub>CO<sub>2</sub>C<sub>6</sub>H<sub>4</sub>NO<sub>2</sub>"],
    ["OH-", "OH<sup>−</sup>"],
    ["SO4^2-", "SO<sub>4</sub><sup>2−</sup>"],
    ["Fe^3+", "Fe<sup>3+</sup>"],
    ["(NH4)2S2O8", "(NH<sub>4</sub>)<sub>2</sub>S<sub>2</sub>O<sub>8</sub>"],
    ["2 H2O", "2 H<sub>2</sub>O"],
    ["4-NP", "4-NP"],
  ])("sets %s", (plain, markup) => {
    expect(renderToStaticMarkup(<Formula text={plain} />)).toBe(
      `<span class="whitespace-nowrap">${markup}</span>`,
    );
  });
});

describe("a rate law", () => {
  const law = {
    constant: "*k*",
    factors: [
      { symbol: "A", order: "1" },
      { symbol: "B", order: "½" },
      { symbol: "C", order: "" },
    ],
  };

  it("is set with raised orders and none where none is to be read", () => {
    expect(renderToStaticMarkup(<LawExpression law={law} />)).toContain(
      "[A]<sup>1</sup></span><span>\u2009[B]<sup>½</sup></span><span>\u2009[C]</span>",
    );
  });

  it("is spoken as one line", () => {
    expect(spokenLaw(law)).toBe("rate = k [A]1 [B]½ [C]");
  });

  it("carries the highlighter on its constant only when it stands", () => {
    const constant = {
      symbol: "*k*",
      number: { value: "11.8", uncertainty: "0.3", power: 0 },
      unit: "L mol^-1 s^-1",
    };
    expect(renderToStaticMarkup(<Constant constant={constant} marked />)).toContain("marked");
    expect(renderToStaticMarkup(<Constant constant={constant} />)).not.toContain("marked");
  });
});
