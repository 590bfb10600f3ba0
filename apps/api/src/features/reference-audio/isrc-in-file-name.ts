import { readIsrc, type Isrc } from '@fieldfare/contracts'

/** Two letters, three letters or figures, seven figures, with or without the marks they are printed with. */
const ISRC_ANYWHERE = /(?<![A-Z0-9])[A-Z]{2}[-_ ]?[A-Z0-9]{3}[-_ ]?[0-9]{2}[-_ ]?[0-9]{5}(?![A-Z0-9])/i

/** The first ISRC that stands in a file name, for example in “03 AA-6Q7-20-00047 Title.flac”. */
export function isrcInFileName(fileName: string): Isrc | null {
  // `\b` and its kin take the underscore for a letter, people take it for a space.
  const match = ISRC_ANYWHERE.exec(fileName.normalize('NFKC').replaceAll(/[‐-―]/g, '-'))
  if (match === null) return null
  const reading = readIsrc(match[0].replaceAll('_', ''))
  return reading.ok ? reading.isrc : null
}
