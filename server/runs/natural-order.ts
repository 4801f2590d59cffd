const PIECES = /\d+|\D+/g;

/** Orders names as people count: run 2 before run 10. The same on every machine, as no locale is asked. */
export function byNaturalOrder(one: string, other: string): number {
  const left: string[] = one.match(PIECES) ?? [];
  const right: string[] = other.match(PIECES) ?? [];
  for (let index = 0; index < Math.min(left.length, right.length); index += 1) {
    const [a = '', b = ''] = [left[index], right[index]];
    const difference = Number(a) - Number(b);
    if (difference) return difference;
    if (a !== b) return a < b ? -1 : 1;
  }
  return left.length - right.length;
}
