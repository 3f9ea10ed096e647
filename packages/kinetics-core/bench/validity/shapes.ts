/**
 * Courses of known shape. x is the part consumed, τ the time in units in which the start has slope 1, so that the true
 * initial slope is the same whatever the shape: τ(x) = ∫₀ˣ du/r(u), r(0) = 1, in closed form for every rate law.
 */
export interface Shape {
  readonly name: string;
  readonly elapsed: (consumed: number) => number;
}

export const SHAPES = [
  ofOrder("order 0", 0),
  ofOrder("order ½", 0.5),
  { name: "order 1", elapsed: (x) => -Math.log1p(-x) },
  ofOrder("order 2", 2),
  ofOrder("order 3", 3),
  { name: "unequal second order, b0 = 1.5 a0", elapsed: (x) => 3 * Math.log((1 - x / 1.5) / (1 - x)) },
  { name: "saturation, K = a0/2", elapsed: (x) => (x - 0.5 * Math.log1p(-x)) / 1.5 },
  { name: "inhibited by product, K·a0 = 2", elapsed: (x) => -3 * Math.log1p(-x) - 2 * x },
  { name: "autocatalytic, p0 = a0", elapsed: (x) => Math.log((1 + x) / (1 - x)) / 2 },
  { name: "reversible to 90 %", elapsed: (x) => -0.9 * Math.log1p(-x / 0.9) },
] as const satisfies readonly Shape[];

export type ShapeName = (typeof SHAPES)[number]["name"];

function ofOrder<Name extends string>(name: Name, order: number) {
  return { name, elapsed: (x: number) => (1 - (1 - x) ** (1 - order)) / (1 - order) };
}

export function shapeNamed(name: ShapeName): Shape {
  const shape = SHAPES.find((one) => one.name === name);
  if (shape === undefined) throw new RangeError(`There is no shape ${name}`);
  return shape;
}

/** Parts consumed at evenly spaced times from 0 to the one at which `conversion` is reached. */
export function courseTo(shape: Shape, conversion: number, readings: number): Float64Array {
  const end = shape.elapsed(conversion);
  return Float64Array.from({ length: readings }, (_, i) =>
    consumedAt(shape, (end * i) / (readings - 1), conversion),
  );
}

/** τ(x) increases, so halving finds x to the last bit. */
function consumedAt({ elapsed }: Shape, time: number, conversion: number): number {
  let low = 0;
  let high = conversion;
  for (let step = 0; step < 60; step++) {
    const middle = (low + high) / 2;
    if (elapsed(middle) < time) low = middle;
    else high = middle;
  }
  return (low + high) / 2;
}
