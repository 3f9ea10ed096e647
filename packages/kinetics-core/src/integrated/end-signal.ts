/**
 * What is known of the signal when the followed species is gone. `known`: a blank, an end reading or a product's molar
 * absorption coefficient, one more observation with its own standard uncertainty (0 means exact). No other nuisance
 * decides more verdicts about an order.
 */
export type EndSignal =
  | { readonly kind: "zero" }
  | { readonly kind: "free" }
  | { readonly kind: "known"; readonly value: number; readonly standardUncertainty: number };

/** The same for a fit, on its scaled signal. `weight`: σ of the trace over u of the end, see `endWeight`. */
export type EndCondition =
  | { readonly kind: "fixed"; readonly value: number }
  | { readonly kind: "free" }
  | { readonly kind: "observed"; readonly value: number; readonly weight: number };
