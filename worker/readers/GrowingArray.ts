/** Numbers appended one by one; half again as much room each time it runs out. */
export class GrowingArray {
  private store = new Float64Array(4096);
  length = 0;

  push(value: number): void {
    if (this.length === this.store.length) {
      const larger = new Float64Array(Math.ceil(this.store.length * 1.5));
      larger.set(this.store);
      this.store = larger;
    }
    this.store[this.length] = value;
    this.length += 1;
  }

  /** A view, valid until the next push. */
  view(): Float64Array {
    return this.store.subarray(0, this.length);
  }
}
