import type { PowerFactor } from "../power-product";
import type { ExpressionProgram, Factor } from "./expression-program";

/**
 * The factors of a program that is a product of powers of concentrations and nothing else, each species and each fitted
 * order once; null otherwise. Such an expression is the built-in law and runs as fast.
 */
export function powersInProgram(program: ExpressionProgram, species: number): readonly PowerFactor[] | null {
  const factors = onlyProduct(program);
  if (factors === null) return null;
  const places = factors.map(({ slot }) => slot);
  const orders = factors.flatMap(({ exponent }) => ("slot" in exponent ? [exponent.slot] : []));
  const isPower =
    places.every((place) => place < species) &&
    orders.every((order) => order >= species && order < program.inputs) &&
    new Set(places).size === places.length &&
    new Set(orders).size === orders.length;
  if (!isPower) return null;
  return factors.map(({ slot, exponent }) => ({
    place: slot,
    order: "held" in exponent ? exponent : { parameter: exponent.slot - species },
  }));
}

function onlyProduct({ inputs, instructions, result }: ExpressionProgram): readonly Factor[] | null {
  const [only, ...more] = instructions;
  if (only === undefined) return result < inputs ? [{ slot: result, exponent: { held: 1 } }] : null;
  return only.kind === "product" && only.constant === 1 && more.length === 0 ? only.factors : null;
}
