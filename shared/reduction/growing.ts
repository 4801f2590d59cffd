const BLOCK = 65536;

/** A list of numbers that grows by blocks: 8 bytes a value, no boxing, nothing copied while it grows. */
export class GrowingFloats {
  private readonly full: Float64Array[] = [];
  private last = new Float64Array(4096);
  private used = 0;

  get length(): number {
    return this.full.length * BLOCK + this.used;
  }

  push(value: number): void {
    if (this.used === this.last.length) this.grow();
    this.last[this.used] = value;
    this.used += 1;
  }

  private grow(): void {
    if (this.used === BLOCK) {
      this.full.push(this.last);
      this.last = new Float64Array(BLOCK);
      this.used = 0;
      return;
    }
    // Most logs are short: the first block starts small.
    const larger = new Float64Array(Math.min(4 * this.used, BLOCK));
    larger.set(this.last);
    this.last = larger;
  }

  /** All values in one array; the list is empty afterwards, so that they are held only once. */
  release(): Float64Array {
    const all = new Float64Array(this.length);
    let at = 0;
    for (let block = this.full.shift(); block; block = this.full.shift()) {
      all.set(block, at);
      at += block.length;
    }
    all.set(this.last.subarray(0, this.used), at);
    this.last = new Float64Array(1);
    this.used = 0;
    return all;
  }
}
