/** A list of numbers in a typed array that doubles when full, so that hot loops allocate nothing. */
export type NumberList = {
  readonly length: () => number
  readonly push: (value: number) => void
  readonly get: (index: number) => number
  /** Forgets the first `count` values. */
  readonly dropFirst: (count: number) => void
  readonly clear: () => void
  readonly toArray: () => Float64Array
}

/** Makes an empty list of double-precision numbers. */
export function createNumberList(capacity = 256): NumberList {
  let values = new Float64Array(capacity)
  let length = 0
  return {
    length: () => length,
    push(value) {
      if (length === values.length) {
        const larger = new Float64Array(values.length * 2)
        larger.set(values)
        values = larger
      }
      values[length++] = value
    },
    get: (index) => values[index],
    dropFirst(count) {
      values.copyWithin(0, count, length)
      length -= count
    },
    clear() {
      length = 0
    },
    toArray: () => values.slice(0, length),
  }
}
