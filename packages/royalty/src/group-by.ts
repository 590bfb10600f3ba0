/** The items by what `keyOf` says of them, in the order in which the keys first appear. */
export function groupBy<Item>(
  items: readonly Item[],
  keyOf: (item: Item) => string,
): ReadonlyMap<string, readonly Item[]> {
  const groups = new Map<string, Item[]>()
  for (const item of items) {
    const key = keyOf(item)
    const group = groups.get(key)
    if (group) group.push(item)
    else groups.set(key, [item])
  }
  return groups
}

/** The sum of one amount of every item. */
export function sumOf<Item>(items: readonly Item[], amountOf: (item: Item) => bigint): bigint {
  return items.reduce((sum, item) => sum + amountOf(item), 0n)
}
