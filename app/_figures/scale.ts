/** From a quantity to a place on the paper; `kind` "log" needs a positive domain. */
export interface Scale {
  (value: number): number;
  readonly domain: readonly [number, number];
  readonly kind: "linear" | "log";
  /** From a place back to the quantity. */
  readonly invert: (place: number) => number;
}

export function makeScale(
  kind: "linear" | "log",
  domain: readonly [number, number],
  from: number,
  to: number,
): Scale {
  const forward = kind === "log" ? Math.log : (value: number) => value;
  const backward = kind === "log" ? Math.exp : (value: number) => value;
  const low = forward(domain[0]);
  const perUnit = (to - from) / (forward(domain[1]) - low);
  const place = (value: number) => round(from + (forward(value) - low) * perUnit);
  return Object.assign(place, {
    kind,
    domain,
    invert: (at: number) => backward(low + (at - from) / perUnit),
  });
}

/** A tenth of a pixel: what is drawn on the server must come back the same from the browser. */
function round(place: number): number {
  return Math.round(place * 10) / 10;
}
