import type { Random } from './random.ts'
import type { Mode } from './tune.ts'

/** Semitones of each degree of a scale above its key note. */
export const SCALES: { readonly [Name in Mode]: readonly number[] } = {
  major: [0, 2, 4, 5, 7, 9, 11],
  minor: [0, 2, 3, 5, 7, 8, 10],
  dorian: [0, 2, 3, 5, 7, 9, 10],
  mixolydian: [0, 2, 4, 5, 7, 9, 10],
}

/** Semitones of a scale degree above the key note; degrees beyond 0 … 6 lie in other octaves. */
export function degreeToSemitones(mode: Mode, degree: number): number {
  const scale = SCALES[mode]
  const octave = Math.floor(degree / scale.length)
  return 12 * octave + (scale[degree - octave * scale.length] ?? 0)
}

/** The three degrees of the chord built in thirds on a degree. */
export function chordDegrees(root: number): readonly [number, number, number] {
  return [root, root + 2, root + 4]
}

/** Chords that commonly follow a chord, by degree of the root. The weight is how often a degree is listed. */
const FOLLOWS: { readonly [Name in Mode]: readonly (readonly number[])[] } = {
  major: [[3, 4, 5, 1, 3, 4, 2], [4, 4, 3], [5, 3, 5], [4, 0, 1, 4, 0], [0, 5, 3, 0, 5], [3, 1, 4, 3], [0]],
  minor: [
    [5, 3, 6, 4, 2, 5],
    [4, 6],
    [5, 6, 3, 5],
    [0, 4, 6, 0],
    [0, 5, 0],
    [2, 6, 3, 6],
    [0, 2, 5, 0],
  ],
  dorian: [
    [3, 6, 3, 4, 2, 1],
    [3, 0, 4],
    [3, 6, 0],
    [0, 0, 6, 4],
    [0, 3, 6],
    [3, 4],
    [0, 3, 0, 2],
  ],
  mixolydian: [
    [6, 3, 4, 3, 6, 1],
    [3, 6, 4],
    [3, 5],
    [0, 0, 6, 1],
    [3, 0, 6],
    [3, 6, 1],
    [3, 0, 0],
  ],
}
/** Chords that lead back to the key note, in each mode. */
const CADENCES: { readonly [Name in Mode]: readonly number[] } = {
  major: [4, 4, 3, 1],
  minor: [4, 6, 5, 4],
  dorian: [3, 6, 4],
  mixolydian: [6, 3, 4],
}

/** A progression of chord roots, one to a bar, which wants to return to its beginning. */
export function drawProgression(random: Random, mode: Mode, bars: number, firstDegree: number): number[] {
  const roots = [firstDegree]
  while (roots.length < bars - 1) {
    const previous = roots[roots.length - 1] ?? 0
    roots.push(random.pick(FOLLOWS[mode][previous] ?? [0]))
  }
  roots.push(random.pick(CADENCES[mode]))
  return roots
}
