import { expect, test } from "vitest";
import { readTypedOrder } from "./read-order";

test("orders are read as they are written at the bench", () => {
  expect(["1", "0.5", "0,5", "½", "1½", "3/2", "−1", "-½", " 2 "].map(readTypedOrder)).toEqual([
    1, 0.5, 0.5, 0.5, 1.5, 1.5, -1, -0.5, 2,
  ]);
});

test("nothing and 'free' set an order free, anything else is refused", () => {
  expect([readTypedOrder(""), readTypedOrder(" Free ")]).toEqual([null, null]);
  expect(["first", "1/0", "1.2.3", "½½", "--1"].map(readTypedOrder)).toEqual(Array(5).fill(undefined));
});
