/** Order by code unit: the same on every machine and in every locale, unlike `localeCompare`. */
export function compareText(left: string, right: string): number {
  if (left < right) return -1
  return left > right ? 1 : 0
}

/** Orders by the first pair that differs. */
export function compareTextLists(left: readonly string[], right: readonly string[]): number {
  for (const [index, text] of left.entries()) {
    const order = compareText(text, right[index] ?? '')
    if (order !== 0) return order
  }
  return 0
}
