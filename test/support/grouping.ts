/** Readings in groups by their labels, in the order the labels first appear. */
export function groupBy<Label>(labels: readonly Label[], readings: readonly number[]): number[][] {
  const groups = new Map<Label, number[]>();
  labels.forEach((label, index) => {
    const group = groups.get(label) ?? [];
    group.push(readings[index]);
    groups.set(label, group);
  });
  return [...groups.values()];
}

/** Readings in groups of groups. */
export const nestBy = <Label>(
  outer: readonly Label[],
  inner: readonly Label[],
  readings: readonly number[],
): number[][][] =>
  [...new Set(outer)].map((label) => {
    const at = outer.flatMap((each, index) => (each === label ? [index] : []));
    return groupBy(
      at.map((index) => inner[index]),
      at.map((index) => readings[index]),
    );
  });

/** The same items in an order that looks random and is always the same. */
export const shuffled = <Item>(items: readonly Item[]): Item[] =>
  items
    .map((item, index) => ({ item, key: Math.sin((index + 1) * 12.9898) }))
    .sort((a, b) => a.key - b.key)
    .map(({ item }) => item);
