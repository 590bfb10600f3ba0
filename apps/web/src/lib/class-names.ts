/** Joins class names, leaving out what a condition switched off. */
export function classNames(...names: (string | false | null | undefined)[]): string {
  return names.filter((name) => typeof name === 'string' && name !== '').join(' ')
}
