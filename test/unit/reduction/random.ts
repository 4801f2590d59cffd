/** Chance for tests: the same for the same seed (mulberry32, from memory). */
export class Random {
  private state: number;

  constructor(seed: number) {
    this.state = seed >>> 0;
  }

  /** Uniform in [0, 1). */
  next(): number {
    this.state = (this.state + 0x6d2b79f5) >>> 0;
    let t = this.state;
    t = Math.imul(t ^ (t >>> 15), t | 1);
    t ^= t + Math.imul(t ^ (t >>> 7), t | 61);
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  }

  /** Whole number from `low` to `high`, both included. */
  whole(low: number, high: number): number {
    return low + Math.floor(this.next() * (high - low + 1));
  }

  pick<T>(items: readonly T[]): T {
    return items[this.whole(0, items.length - 1)];
  }

  chance(probability: number): boolean {
    return this.next() < probability;
  }

  normal(): number {
    return Math.sqrt(-2 * Math.log(1 - this.next())) * Math.cos(2 * Math.PI * this.next());
  }

  shuffled<T>(items: readonly T[]): T[] {
    const list = [...items];
    for (let i = list.length - 1; i > 0; i -= 1) {
      const j = this.whole(0, i);
      [list[i], list[j]] = [list[j], list[i]];
    }
    return list;
  }
}
