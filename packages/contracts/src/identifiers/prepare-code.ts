/** NFKC, trimmed, upper-case, with every Unicode dash as '-': how pasted identifiers are made comparable. */
export function prepareCode(input: string): string {
  return input
    .normalize('NFKC')
    .trim()
    .toUpperCase()
    .replace(/[\p{Pd}\u2212]/gu, '-')
}
