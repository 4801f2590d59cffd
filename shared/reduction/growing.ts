/** A list of numbers that grows in place: 8 bytes a value, no boxing. */
export class GrowingFloats {
  private values = new Float64Array(4096);
  length = 0;

  push(value: number): void {
    if (this.length === this.values.length) {
      const larger = new Float64Array(this.length * 2);
      larger.set(this.values);
      this.values = larger;
    }
    this.values[this.length] = value;
    this.length += 1;
  }

  /** The values so far; a view, valid until the next `push`. */
  view(): Float64Array {
    return this.values.subarray(0, this.length);
  }
}
