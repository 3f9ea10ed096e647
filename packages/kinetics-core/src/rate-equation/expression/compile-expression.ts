import type { ExpressionNode } from "./expression-node";
import type { Exponent, ExpressionProgram, Factor, Instruction } from "./expression-program";

/** Where names find their values: the slot of a species or a parameter, or a parameter that is held at a number. */
export interface NamedSlots {
  readonly species: ReadonlyMap<string, number>;
  readonly parameters: ReadonlyMap<string, ParameterPlace>;
}

export type ParameterPlace = { readonly slot: number } | { readonly held: number };

/**
 * Every node is first a product, constant · Π factor^exponent, and becomes an instruction only where something else
 * than a product is made of it: `k [A]^a [B]^b` is a single instruction, as is any quotient of powers. Equal parts are
 * computed once.
 */
export function compileExpression(
  node: ExpressionNode,
  names: NamedSlots,
): ExpressionProgram | ConstantWithoutValue {
  const compiler = new Compiler(names);
  const result = compiler.slotOf(compiler.product(node));
  const { inputs, instructions, withoutValue } = compiler;
  return withoutValue === null ? { inputs, instructions, result } : { withoutValue };
}

/** Numbers alone make no number there, as in 1/0 or ln(−1). */
export interface ConstantWithoutValue {
  readonly withoutValue: ExpressionNode;
}

interface Product {
  readonly constant: number;
  readonly factors: readonly Factor[];
}

class Compiler {
  readonly instructions: Instruction[] = [];
  readonly inputs: number;
  /** The innermost part found. */
  withoutValue: ExpressionNode | null = null;
  private readonly slotByText = new Map<string, number>();
  private readonly speciesSlots: ReadonlySet<number>;

  constructor(private readonly names: NamedSlots) {
    const fitted = [...names.parameters.values()].filter((place) => "slot" in place);
    this.inputs = names.species.size + fitted.length;
    this.speciesSlots = new Set(names.species.values());
  }

  product(node: ExpressionNode): Product {
    const product = this.productOf(node);
    if (!Number.isFinite(product.constant)) this.withoutValue ??= node;
    return product;
  }

  private productOf(node: ExpressionNode): Product {
    switch (node.kind) {
      case "number":
        return number(node.value);
      case "species":
        return slot(this.names.species.get(node.name) ?? missing(node.name));
      case "parameter": {
        const place = this.names.parameters.get(node.name) ?? missing(node.name);
        return "held" in place ? number(place.held) : slot(place.slot);
      }
      case "negative":
        return times(number(-1), this.product(node.of));
      case "function":
        return this.call(node.name, this.product(node.of));
      default:
        return this.operation(node);
    }
  }

  private operation(node: Extract<ExpressionNode, { kind: "operation" }>): Product {
    const { operator } = node;
    if (operator === "+" || operator === "-") return this.sum(node);
    const left = this.product(node.left);
    const right = this.product(node.right);
    if (operator === "*") return times(left, right);
    return operator === "/" ? times(left, this.raised(right, -1)) : this.power(left, right);
  }

  private power(base: Product, exponent: Product): Product {
    if (exponent.factors.length === 0) return this.raised(base, exponent.constant);
    return { constant: 1, factors: [{ slot: this.slotOf(base), exponent: { slot: this.slotOf(exponent) } }] };
  }

  /** (x y)^n = x^n y^n for whole n, or where no factor can be negative. */
  private raised(base: Product, exponent: number): Product {
    if (exponent === 1) return base;
    const { constant, factors } = base;
    if (factors.length === 0) return number(constant ** exponent);
    const held = factors.flatMap(({ slot, exponent: own }) =>
      "held" in own ? [{ slot, held: own.held }] : [],
    );
    const isPositive = constant > 0 && factors.every((factor) => this.speciesSlots.has(factor.slot));
    if (held.length < factors.length || !(Number.isInteger(exponent) || isPositive)) {
      return powerOf(this.slotOf(base), exponent);
    }
    const raisedFactors = held.map((one) => ({ slot: one.slot, exponent: { held: one.held * exponent } }));
    return { constant: constant ** exponent, factors: withoutZeros(raisedFactors) };
  }

  private call(name: "exp" | "ln" | "log10" | "sqrt", of: Product): Product {
    if (name === "sqrt") return this.raised(of, 1 / 2);
    if (of.factors.length === 0)
      return number(name === "exp" ? Math.exp(of.constant) : Math.log(of.constant) * scaleOf(name));
    const instruction = { kind: name === "exp" ? "exp" : "ln", slot: this.slotOf(of) } as const;
    return times(number(scaleOf(name)), slot(this.add(instruction)));
  }

  private sum(node: ExpressionNode): Product {
    let constant = 0;
    const weights = new Map<number, number>();
    for (const { product, sign } of this.terms(node, 1)) {
      if (product.factors.length === 0) {
        constant += sign * product.constant;
        continue;
      }
      const place = this.slotOf({ constant: 1, factors: product.factors });
      weights.set(place, (weights.get(place) ?? 0) + sign * product.constant);
    }
    const terms = [...weights].map(([place, weight]) => ({ slot: place, weight }));
    return terms.length === 0 ? number(constant) : slot(this.add({ kind: "sum", constant, terms }));
  }

  private terms(node: ExpressionNode, sign: number): { product: Product; sign: number }[] {
    if (node.kind === "negative") return this.terms(node.of, -sign);
    if (node.kind !== "operation" || (node.operator !== "+" && node.operator !== "-")) {
      return [{ product: this.product(node), sign }];
    }
    return [...this.terms(node.left, sign), ...this.terms(node.right, node.operator === "-" ? -sign : sign)];
  }

  /** The slot that holds the product; an instruction where none does yet. */
  slotOf(product: Product): number {
    const { constant, factors } = product;
    const [only, ...more] = factors;
    if (only === undefined) return this.add({ kind: "sum", constant, terms: [] });
    const isPlain = more.length === 0 && "held" in only.exponent && only.exponent.held === 1;
    if (isPlain && constant === 1) return only.slot;
    return this.add(
      isPlain
        ? { kind: "sum", constant: 0, terms: [{ slot: only.slot, weight: constant }] }
        : { kind: "product", constant, factors },
    );
  }

  private add(instruction: Instruction): number {
    const text = JSON.stringify(instruction);
    const known = this.slotByText.get(text);
    if (known !== undefined) return known;
    const place = this.inputs + this.instructions.push(instruction) - 1;
    this.slotByText.set(text, place);
    return place;
  }
}

function number(constant: number): Product {
  return { constant, factors: [] };
}

function slot(place: number): Product {
  return powerOf(place, 1);
}

function powerOf(place: number, exponent: number): Product {
  return { constant: 1, factors: exponent === 0 ? [] : [{ slot: place, exponent: { held: exponent } }] };
}

function times(left: Product, right: Product): Product {
  const factors: Factor[] = [];
  for (const factor of [...left.factors, ...right.factors]) {
    const same = factors.findIndex(
      (one) => one.slot === factor.slot && bothHeld(one.exponent, factor.exponent),
    );
    const known = factors[same];
    if (known === undefined) factors.push(factor);
    else
      factors[same] = {
        slot: known.slot,
        exponent: { held: heldIn(known.exponent) + heldIn(factor.exponent) },
      };
  }
  return { constant: left.constant * right.constant, factors: withoutZeros(factors) };
}

function bothHeld(one: Exponent, other: Exponent): boolean {
  return "held" in one && "held" in other;
}

function heldIn(exponent: Exponent): number {
  return "held" in exponent ? exponent.held : 0;
}

function withoutZeros(factors: readonly Factor[]): readonly Factor[] {
  return factors.filter(({ exponent }) => !("held" in exponent && exponent.held === 0));
}

function scaleOf(name: "exp" | "ln" | "log10"): number {
  return name === "log10" ? Math.LOG10E : 1;
}

function missing(name: string): never {
  throw new RangeError(`${name} has no place among the species and parameters of the expression`);
}
