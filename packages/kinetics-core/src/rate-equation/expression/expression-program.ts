/**
 * An expression as a short list of instructions on numbered slots: first the species' concentrations, then the
 * parameters, then one slot for what each instruction computes. Values go down the list and derivatives of the last
 * slot come up it (reverse accumulation, Griewank and Walther, Evaluating Derivatives, 2nd ed., SIAM 2008, chapter 3):
 * all derivatives together cost about as much as the value, however many there are, where carrying each along would
 * cost the value once more for every species and parameter.
 */
export interface ExpressionProgram {
  readonly inputs: number;
  readonly instructions: readonly Instruction[];
  /** The slot that holds f. */
  readonly result: number;
}

export type Instruction = SumInstruction | ProductInstruction | FunctionInstruction;

/** constant + Σ weight·slot. */
export interface SumInstruction {
  readonly kind: "sum";
  readonly constant: number;
  readonly terms: readonly { readonly slot: number; readonly weight: number }[];
}

/** constant · Π slot^exponent: the powers of all factors share one exponential. */
export interface ProductInstruction {
  readonly kind: "product";
  readonly constant: number;
  readonly factors: readonly Factor[];
}

export interface Factor {
  readonly slot: number;
  readonly exponent: Exponent;
}

/** A number, or the slot in which the exponent stands. */
export type Exponent = { readonly held: number } | { readonly slot: number };

export interface FunctionInstruction {
  readonly kind: "exp" | "ln";
  readonly slot: number;
}
