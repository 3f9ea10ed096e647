import { uniformFloat64 } from "pure-rand/distribution/uniformFloat64";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";

/** Draws of a standard normal deviate, the same for the same seed on every machine. */
export function normalDraws(seed: number): () => number {
  const generator = xoroshiro128plus(seed);
  // The first outputs of neighbouring seeds resemble each other; the state needs some steps to mix.
  for (let step = 0; step < 64; step++) uniformFloat64(generator);
  // Box and Muller (1958), one of the two deviates; 1 − u keeps the logarithm's argument above zero.
  return () =>
    Math.sqrt(-2 * Math.log(1 - uniformFloat64(generator))) *
    Math.cos(2 * Math.PI * uniformFloat64(generator));
}
