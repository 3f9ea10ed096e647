/** Numbers appended one at a time into typed memory, since millions of boxed ones would not fit. */
export class GrowingArray {
  private values = new Float64Array(64);
  length = 0;

  push(value: number): void {
    if (this.length === this.values.length) {
      const wider = new Float64Array(this.values.length * 2);
      wider.set(this.values);
      this.values = wider;
    }
    this.values[this.length] = value;
    this.length += 1;
  }

  last(): number | undefined {
    return this.length === 0 ? undefined : this.values[this.length - 1];
  }

  /** The numbers so far; a view, valid until the next push. */
  view(): Float64Array {
    return this.values.subarray(0, this.length);
  }
}
