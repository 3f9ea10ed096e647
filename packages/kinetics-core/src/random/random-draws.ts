import { uniformFloat64 } from "pure-rand/distribution/uniformFloat64";
import { xoroshiro128plus } from "pure-rand/generator/xoroshiro128plus";

/** Draws that are the same for the same seed on every machine. */
export interface RandomDraws {
  /** From 0 up to, not including, 1. */
  uniform(): number;
  /** Standard normal deviate. */
  normal(): number;
  /** Whole number from 0 up to, not including, `below`. */
  whole(below: number): number;
}

/** The first outputs of neighbouring seeds resemble each other; the state needs some steps to mix. */
const STEPS_BEFORE_FIRST_DRAW = 64;

/** `seed`: a whole number. Uniform draws by xoroshiro128+ (Blackman and Vigna), normal ones by Box and Muller (1958). */
export function randomDraws(seed: number): RandomDraws {
  const generator = xoroshiro128plus(seed);
  const uniform = () => uniformFloat64(generator);
  for (let step = 0; step < STEPS_BEFORE_FIRST_DRAW; step++) uniform();
  return {
    uniform,
    // 1 − u keeps the logarithm's argument above zero.
    normal: () => Math.sqrt(-2 * Math.log1p(-uniform())) * Math.cos(2 * Math.PI * uniform()),
    whole: (below) => Math.floor(uniform() * below),
  };
}
