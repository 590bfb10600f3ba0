/** Coefficients of the Lanczos approximation for g = 7, n = 9 (P. Godfrey 2001); error below 1e-13 for x > 0. */
const LANCZOS = [
  0.99999999999980993, 676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059,
  12.507343278686905, -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
] as const

/** Natural logarithm of the gamma function for x > 0. */
export function logGamma(x: number): number {
  if (x < 0.5) return Math.log(Math.PI / Math.sin(Math.PI * x)) - logGamma(1 - x)
  const shifted = x - 1
  let sum: number = LANCZOS[0]
  for (let i = 1; i < LANCZOS.length; i++) sum += LANCZOS[i] / (shifted + i)
  const base = shifted + 7.5
  return 0.5 * Math.log(2 * Math.PI) + (shifted + 0.5) * Math.log(base) - base + Math.log(sum)
}

/** Sums a tail whose first term has this logarithm; `ratio(n)` is term n + 1 over term n. */
function logTail(logFirst: number, first: number, ratio: (n: number) => number): number {
  let sum = 1
  let term = 1
  for (let n = first; n < first + 100_000; n++) {
    term *= ratio(n)
    sum += term
    if (term < sum * 1e-15) break
    if (sum > 1e200) return 0
  }
  return Math.min(0, logFirst + Math.log(sum))
}

/** Natural logarithm of P(X ≥ count) for a Poisson law. */
export function logPoissonTail(count: number, mean: number): number {
  if (count <= 0) return 0
  if (mean <= 0) return -Infinity
  const logFirst = count * Math.log(mean) - mean - logGamma(count + 1)
  return logTail(logFirst, count, (n) => mean / (n + 1))
}

/**
 * Natural logarithm of P(X ≥ count) for a negative binomial law of this mean whose variance is `dispersion` times the
 * mean; a Poisson law when that is 1 or less. `count` may be fractional (weighted evidence).
 */
export function logOverdispersedTail(count: number, mean: number, dispersion: number): number {
  if (dispersion <= 1.001) return logPoissonTail(count, mean)
  if (count <= 0) return 0
  if (mean <= 0) return -Infinity
  const size = mean / (dispersion - 1)
  const chance = (dispersion - 1) / dispersion
  const logFirst =
    logGamma(count + size) -
    logGamma(size) -
    logGamma(count + 1) +
    size * Math.log(1 - chance) +
    count * Math.log(chance)
  return logTail(logFirst, count, (n) => ((n + size) / (n + 1)) * chance)
}
