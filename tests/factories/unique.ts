let count = 0

/** A number no other row of this test file has. */
export function nextNumber(): number {
  count += 1
  return count
}

/** The first of the rows an insert returned. */
export function inserted<Row>(rows: readonly Row[]): Row {
  const [row] = rows
  if (row === undefined) throw new Error('The insert returned no row')
  return row
}
