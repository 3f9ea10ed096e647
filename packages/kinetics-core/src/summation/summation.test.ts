import { describe, expect, it } from "vitest";
import { mean, squaresAboutMean } from "./mean";
import { median, medianOfSorted } from "./median";
import { sum, sumOfSquares } from "./sum";

describe("sum", () => {
  it("adds numbers and their squares, and gives 0 for none", () => {
    expect(sum([1, 2, 4])).toBe(7);
    expect(sumOfSquares(Float64Array.of(1, 2, 4))).toBe(21);
    expect([sum([]), sumOfSquares([])]).toEqual([0, 0]);
  });
});

describe("mean", () => {
  it("is the sum over the number of values, and not a number for none", () => {
    expect(mean([1, 2, 6])).toBe(3);
    expect(mean([])).toBeNaN();
  });

  it("squares about it keep their digits on a large offset", () => {
    expect(squaresAboutMean([1e9 + 1, 1e9 + 2, 1e9 + 3])).toBe(2);
    expect(squaresAboutMean([5])).toBe(0);
  });
});

describe("median", () => {
  it("is the middle value by size, whatever the order, and leaves the values where they are", () => {
    const values = [10, 9, 200];
    expect(median(values)).toBe(10);
    expect(values).toEqual([10, 9, 200]);
  });

  it("is the mean of the two in the middle for an even number, and not a number for none", () => {
    expect(median([4, 1, 3, 100])).toBe(3.5);
    expect(medianOfSorted(Float64Array.of(1, 3, 4, 100))).toBe(3.5);
    expect(median([])).toBeNaN();
  });
});
