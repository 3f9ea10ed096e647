import fc from "fast-check";
import { describe, expect, it } from "vitest";
import type { ExpressionFaultCode } from "./expression-fault";
import { parseExpression } from "./parse-expression";
import { printExpression } from "./print-expression";

fc.configureGlobal({ seed: 1864 });

const SPECIES = ["A", "B", "P", "[Fe(CN)6]3-", "S₂O₈²⁻"];

function printed(text: string): string {
  const node = parseExpression(text, SPECIES);
  if ("status" in node) throw new Error(node.message);
  return printExpression(node);
}

describe("how an expression is read", () => {
  it.each([
    ["k[A]^a[B]^b", "k [A]^a [B]^b"],
    ["k A B", "k [A] [B]"],
    ["v = k*[A]", "k [A]"],
    ["rate = k*[A]", "k [A]"],
    ["k·[A]²×[B]⁻¹", "k [A]^2 [B]^(−1)"],
    ["k [A]**2", "k [A]^2"],
    ["k [A]^½", "k [A]^0.5"],
    ["[A] − [B] – [P] - k", "[A] − [B] − [P] − k"],
    ["k ÷ 2 ∕ 3", "k/2/3"],
    ["2^3^2", "2^(3^2)"],
    ["(2^3)^2", "(2^3)^2"],
    ["−[A]^2", "−[A]^2"],
    ["(−[A])^2", "(−[A])^2"],
    ["k^-a", "k^(−a)"],
    ["2·-3", "2 · −3"],
    ["+k", "k"],
    ["k (([A]))", "k [A]"],
    ["k/(K + [A]) [B]", "k/(K + [A]) · [B]"],
    ["(k/K) [B]", "k/K · [B]"],
    ["k exp(−[A]/c) [B]", "k exp(−[A]/c) [B]"],
    ["k/exp([A]) [B]", "k/exp([A]) · [B]"],
    ["([A]^2)/3", "([A]^2)/3"],
    ["k [[Fe(CN)6]3-]", "k [[Fe(CN)6]3-]"],
    ["k [S2O82−]", "k [S₂O₈²⁻]"],
    ["k₁ k1", "k1 k1"],
    ["µ μ", "μ μ"],
    ["k_obs k′ k'", "k_obs k′ k'"],
    ["1.5e-3 k + .5 + 2.", "0.0015 k + 0.5 + 2"],
    ["2exp(k)", "2 exp(k)"],
    ["k\u00a0[A]\n\t[B]", "k [A] [B]"],
  ])("%s", (text, expected) => {
    expect(printed(text)).toBe(expected);
  });

  it("takes the name k for the rate constant even where a species is called so", () => {
    expect(parseExpression("k", ["k"])).toMatchObject({ kind: "parameter", name: "k" });
    expect(parseExpression("[k]", ["k"])).toMatchObject({ kind: "species", name: "k" });
  });
});

describe("what cannot be read is named, with its place", () => {
  it.each<[text: string, code: ExpressionFaultCode, caret: string]>([
    ["", "empty", "^"],
    ["  ", "empty", "^"],
    ["v =", "empty", "   ^"],
    ["k = 3", "equals-sign", "  ^"],
    ["k [X]", "species-unknown", "  ^^^"],
    ["k [__proto__]", "species-unknown", "  ^^^^^^^^^^^"],
    ["k []", "something-missing", "  ^^"],
    ["k [A", "bracket-not-closed", "  ^"],
    ["k A]", "bracket-not-opened", "   ^"],
    ["k (A", "bracket-not-closed", "  ^"],
    ["k A)", "bracket-not-opened", "   ^"],
    ["k (A + )", "something-missing", "       ^"],
    ["k + ", "something-missing", "   ^"],
    ["* k", "something-missing", "^"],
    ["k ()", "something-missing", "   ^"],
    ["k * / A", "something-missing", "    ^"],
    ["k exp", "function-without-argument", "  ^^^"],
    ["k exp A", "function-without-argument", "  ^^^"],
    ["k sin(A)", "function-unknown", "  ^^^"],
    ["k log(A)", "function-unknown", "  ^^^"],
    ["k e^(A)", "function-unknown", "  ^"],
    ["k A 2", "unclear-product", "    ^"],
    ["k A/B P", "unclear-division", "      ^"],
    ["k A^1/2", "unclear-division", "    ^^^"],
    ["k 0,5", "decimal-comma", "   ^"],
    ["k 1e999", "number-out-of-range", "  ^^^^^"],
    ["1e-999 k", "number-out-of-range", "^^^^^^"],
    ["k $ A", "unknown-character", "  ^"],
    ["k\u200b A", "unknown-character", " ^"],
    ["k \ud83d\ude00", "unknown-character", "  ^^"],
    ["k \ud83d", "unknown-character", "  ^"],
    ["_k A", "unknown-character", "^"],
    [`k ${"a".repeat(33)}`, "name-too-long", `  ${"^".repeat(33)}`],
  ])("%s", (text, code, caret) => {
    const node = parseExpression(text, SPECIES);
    if (!("status" in node)) throw new Error(`read as ${printExpression(node)}`);
    expect({ code: node.code, caret: " ".repeat(node.position) + "^".repeat(node.length) }).toEqual({
      code,
      caret,
    });
    expect(node.message).toMatch(/^[^.]+.*\. .+\.$/);
  });
});

describe("hostile text", () => {
  it.each<[string, string, ExpressionFaultCode]>([
    ["fifty thousand characters", "k*".repeat(25_000), "too-long"],
    ["a hundred thousand parentheses", "(".repeat(100_000), "too-long"],
    ["a name without end", "a".repeat(50_000), "too-long"],
    ["parentheses up to the limit", "(".repeat(1000), "too-deep"],
    ["signs up to the limit", "-".repeat(1000), "too-deep"],
    ["exponents up to the limit", `${"2^".repeat(499)}2`, "too-deep"],
    ["brackets up to the limit", "[".repeat(1000), "bracket-not-closed"],
    ["sums up to the limit", `${"k+".repeat(499)}k`, "too-many-steps"],
    ["zero characters", "\0".repeat(500), "unknown-character"],
    ["a direction override", "k\u202e[A]", "unknown-character"],
    ["a byte order mark in a name", "k\ufeff\u2060A", "unknown-character"],
  ])("%s ends in a named failure at once", (_, text, code) => {
    const start = performance.now();
    expect(parseExpression(text, SPECIES)).toMatchObject({ status: "not-an-expression", code });
    expect(performance.now() - start).toBeLessThan(200);
  });

  it("of any kind gives an expression or a fault within the text", () => {
    const pieces = fc.oneof(
      fc.string({ unit: "binary" }),
      fc.constantFrom(
        "[A]",
        "k",
        "^",
        "(",
        ")",
        "/",
        "2",
        "exp(",
        "⁻¹",
        "[",
        "]",
        "−",
        "=",
        ",",
        " ",
        "1e",
        ".",
      ),
    );
    fc.assert(
      fc.property(fc.array(pieces, { maxLength: 30 }), (parts) => {
        const text = parts.join("");
        const node = parseExpression(text, SPECIES);
        expect(node.position).toBeGreaterThanOrEqual(0);
        expect(node.length).toBeGreaterThanOrEqual(1);
        expect(node.position + node.length).toBeLessThanOrEqual(text.length + 1);
        if ("status" in node) expect(node.message.length).toBeLessThan(400);
      }),
      { numRuns: 1000 },
    );
  });
});
