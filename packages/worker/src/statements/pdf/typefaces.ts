import { readFileSync } from 'node:fs'
import { createRequire } from 'node:module'
import { create } from 'fontkit'

/** The typefaces of a statement, by use. */
export type Face = 'serif' | 'serifStrong' | 'sans' | 'sansStrong' | 'mono' | 'monoStrong'

const FILES = {
  serif: 'newsreader/500Medium/Newsreader_500Medium.ttf',
  serifStrong: 'newsreader/600SemiBold/Newsreader_600SemiBold.ttf',
  sans: 'source-sans-3/400Regular/SourceSans3_400Regular.ttf',
  sansStrong: 'source-sans-3/600SemiBold/SourceSans3_600SemiBold.ttf',
  mono: 'ibm-plex-mono/400Regular/IBMPlexMono_400Regular.ttf',
  monoStrong: 'ibm-plex-mono/600SemiBold/IBMPlexMono_600SemiBold.ttf',
} as const satisfies Record<Face, string>

/** The face that stands in for one that lacks a letter: the sans holds Latin, Greek and Cyrillic. */
const STAND_INS = {
  serif: 'sans',
  serifStrong: 'sansStrong',
  sans: 'sans',
  sansStrong: 'sansStrong',
  mono: 'sans',
  monoStrong: 'sansStrong',
} as const satisfies Record<Face, Face>

/** Shown for a letter that no face of the statement holds. */
export const MISSING_LETTER = '\u25a1'

export const FACES: readonly Face[] = ['serif', 'serifStrong', 'sans', 'sansStrong', 'mono', 'monoStrong']

/**
 * A space has no outline. Where it is the last glyph of a file whose last table holds the outlines, the font library
 * reads the bounds of that empty outline past the end of the file; zeros there are bounds of nothing.
 */
const FILE_END = Buffer.alloc(16)

type LoadedFace = { bytes: Buffer; ascent: number; holds: (letter: string) => boolean }

const loaded = new Map<Face, LoadedFace>()

/** The font file of a face; read once in the life of the process. */
export function faceBytes(face: Face): Buffer {
  return load(face).bytes
}

/** The height of a face above its baseline, in parts of the type size. */
export function faceAscent(face: Face): number {
  return load(face).ascent
}

/** Text as it can be set: the face to set it in, and the letters no face holds replaced. */
export type SettableText = { readonly text: string; readonly face: Face; readonly lostLetters: boolean }

/** Chooses a face that holds the whole text, and marks letters that none holds rather than dropping them. */
export function makeSettable(text: string, face: Face): SettableText {
  // Composed letters have a glyph of their own far more often than a letter with combining marks.
  const letters = Array.from(text.normalize('NFC').replace(/\s+/g, ' ').trim())
  if (letters.every((letter) => load(face).holds(letter))) {
    return { text: letters.join(''), face, lostLetters: false }
  }
  const standIn = STAND_INS[face]
  const settable = letters.map((letter) => (load(standIn).holds(letter) ? letter : MISSING_LETTER))
  const lostLetters = settable.some((letter, index) => letter !== letters[index])
  return { text: settable.join(''), face: standIn, lostLetters }
}

function load(face: Face): LoadedFace {
  const known = loaded.get(face)
  if (known) return known
  const path = createRequire(import.meta.url).resolve(`@expo-google-fonts/${FILES[face]}`)
  const bytes = Buffer.concat([readFileSync(path), FILE_END])
  const font = create(bytes)
  if (!('hasGlyphForCodePoint' in font)) throw new Error(`${path} is a collection, not a single font.`)
  const entry: LoadedFace = {
    bytes,
    ascent: font.ascent / font.unitsPerEm,
    holds: (letter) => {
      const codePoint = letter.codePointAt(0)
      // The space that does not break is set as a space by every face.
      return codePoint !== undefined && (codePoint === 0xa0 || font.hasGlyphForCodePoint(codePoint))
    },
  }
  loaded.set(face, entry)
  return entry
}
