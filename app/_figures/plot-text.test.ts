import { describe, expect, it } from "vitest";
import { literal, markedUp } from "./plot-text";

describe("text for the interactive plot", () => {
  it("shows a name as it was written, whatever markup it spells", () => {
    expect(literal('<a href="https://elsewhere.example">R01</a>')).toBe(
      '&lt;a href="https://elsewhere.example"&gt;R01&lt;/a&gt;',
    );
    expect(literal("a &lt; b %{x}")).toBe("a &amp;lt; b %&#123;x}");
  });

  it("sets what prose marks, and nothing that only looks like HTML", () => {
    expect(markedUp("*k*_0 / s^-1")).toBe("<i>k</i><sub>0</sub> / s<sup>−1</sup>");
    expect(markedUp("<b>absorbance</b> at pH < 7")).toBe("&lt;b&gt;absorbance&lt;/b&gt; at pH &lt; 7");
  });
});
