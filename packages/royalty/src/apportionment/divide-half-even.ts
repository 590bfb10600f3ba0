/**
 * The quotient rounded to the nearest whole number; a half goes to the even neighbour (IEEE 754-2019, section 4.3.1,
 * roundTiesToEven), so that many roundings do not lean one way. The divisor is above zero.
 */
export function divideHalfEven(dividend: bigint, divisor: bigint): bigint {
  if (dividend < 0n) return -divideHalfEven(-dividend, divisor)
  const floor = dividend / divisor
  const twice = 2n * (dividend % divisor)
  if (twice < divisor) return floor
  if (twice > divisor) return floor + 1n
  return floor % 2n === 0n ? floor : floor + 1n
}
