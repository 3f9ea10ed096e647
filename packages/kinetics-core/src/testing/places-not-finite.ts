/**
 * Places of all numbers in plain data that are NaN or infinite, "orders.A.estimate": empty for what the library may
 * hand out. Looked for in tests alone.
 */
export function placesNotFinite(value: unknown, place = ""): readonly string[] {
  if (typeof value === "number") return Number.isFinite(value) ? [] : [`${place}: ${value}`];
  if (typeof value !== "object" || value === null) return [];
  return Object.entries(value).flatMap(([name, part]) =>
    placesNotFinite(part, place === "" ? name : `${place}.${name}`),
  );
}
