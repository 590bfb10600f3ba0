import { chordDegrees } from './harmony.ts'
import type { Random } from './random.ts'
import type { Drum } from './tune.ts'

/** A note of the accompaniment inside one bar: a chord tone by number, or a whole chord. */
export type PatternNote = {
  readonly beat: number
  readonly beats: number
  /** Degrees above the chord's root. */
  readonly steps: readonly number[]
  readonly stress: number
}

/** A stroke inside one bar. */
export type PatternHit = { readonly beat: number; readonly drum: Drum; readonly stress: number }

const TRIAD = chordDegrees(0)

/** Draws how the chords are played: a pattern for one bar, kept through a section. */
export function drawChordPattern(random: Random, beatsPerBar: number): PatternNote[] {
  const style = random.pick(['blocks', 'offbeats', 'arpeggio', 'broken', 'strum'] as const)
  const notes: PatternNote[] = []
  switch (style) {
    case 'blocks':
      for (let beat = 0; beat < beatsPerBar; beat += 2) {
        notes.push({ beat, beats: Math.min(2, beatsPerBar - beat) * 0.95, steps: TRIAD, stress: 0.8 })
      }
      break
    case 'offbeats':
      for (let beat = 0; beat < beatsPerBar; beat++) {
        notes.push({ beat: beat + 0.5, beats: 0.4, steps: TRIAD, stress: 0.8 })
      }
      break
    case 'arpeggio':
    case 'broken': {
      const rising = random.pick([
        [0, 2, 4, 7, 4, 2, 4, 2],
        [0, 4, 7, 9, 7, 4, 7, 4],
        [7, 4, 2, 0, 2, 4, 7, 4],
      ])
      const order = style === 'arpeggio' ? rising : [0, 4, 2, 4, 0, 4, 2, 4]
      for (let i = 0; i < 2 * beatsPerBar; i++) {
        notes.push({ beat: i / 2, beats: 0.9, steps: [order[i] ?? 0], stress: i % 2 === 0 ? 0.85 : 0.65 })
      }
      break
    }
    case 'strum':
      for (let i = 0; i < 2 * beatsPerBar; i++) {
        const isOffbeat = i % 2 === 1
        if (random.chance(isOffbeat ? 0.6 : 0.9)) {
          notes.push({ beat: i / 2, beats: 0.6, steps: [...TRIAD, 7], stress: isOffbeat ? 0.6 : 0.8 })
        }
      }
      break
  }
  return notes
}

/** Draws how the bass moves within a bar. */
export function drawBassPattern(random: Random, beatsPerBar: number): PatternNote[] {
  const style = random.pick(['held', 'rootAndFifth', 'walking', 'driving', 'syncopated'] as const)
  const note = (beat: number, beats: number, step: number, stress = 0.9): PatternNote => ({
    beat,
    beats,
    steps: [step],
    stress,
  })
  switch (style) {
    case 'held':
      return [note(0, beatsPerBar * 0.9, 0, 1)]
    case 'rootAndFifth':
      return beatsPerBar === 3
        ? [note(0, 1.8, 0), note(2, 0.9, 4, 0.8)]
        : [note(0, 1.8, 0), note(2, 1.8, 4, 0.8)]
    case 'walking': {
      const steps = random.pick([
        [0, 2, 4, 5],
        [0, 1, 2, 4],
        [0, 4, 7, 4],
      ])
      return steps.slice(0, beatsPerBar).map((step, beat) => note(beat, 0.9, step, beat === 0 ? 0.95 : 0.8))
    }
    case 'driving':
      return Array.from({ length: 2 * beatsPerBar }, (_, i) => note(i / 2, 0.45, 0, i % 2 === 0 ? 0.9 : 0.7))
    case 'syncopated':
      return beatsPerBar === 3
        ? [note(0, 1.4, 0), note(1.5, 0.5, 0, 0.7), note(2, 0.9, 4, 0.8)]
        : [note(0, 1.4, 0), note(1.5, 1, 0, 0.8), note(2.5, 0.5, 4, 0.7), note(3, 0.9, 7, 0.8)]
  }
}

type DrumStyle = 'none' | 'brushes' | 'rock' | 'fourToTheFloor' | 'halfTime' | 'shaker'

/** Draws the drum style of a tune; some have no drums at all. */
export function drawDrumStyle(random: Random): DrumStyle {
  return random.pick(['none', 'brushes', 'rock', 'rock', 'fourToTheFloor', 'halfTime', 'shaker'] as const)
}

function pulse(drum: Drum, beats: readonly number[], stress: number): PatternHit[] {
  return beats.map((beat) => ({ beat, drum, stress: beat % 1 === 0 ? stress : stress * 0.7 }))
}

/** One bar of drums in a style. */
export function drawDrumPattern(random: Random, style: DrumStyle, beatsPerBar: number): PatternHit[] {
  const beats = Array.from({ length: beatsPerBar }, (_, beat) => beat)
  const halves = Array.from({ length: 2 * beatsPerBar }, (_, i) => i / 2)
  const backbeats = beatsPerBar === 3 ? [1, 2] : [1, 3]
  const extraKick = random.pick([[], [2.5], [1.5], [1.5, 2.5], [0.5]])
  switch (style) {
    case 'none':
      return []
    case 'brushes':
      return [...pulse('kick', [0], 0.6), ...pulse('snare', backbeats, 0.35), ...pulse('hat', halves, 0.35)]
    case 'rock':
      return [
        ...pulse('kick', beatsPerBar === 3 ? [0] : [0, 2, ...extraKick.filter((beat) => beat !== 2)], 0.9),
        ...pulse('snare', beatsPerBar === 3 ? [2] : backbeats, 0.8),
        ...pulse('hat', random.chance(0.5) ? halves : beats, 0.5),
      ]
    case 'fourToTheFloor':
      return [
        ...pulse('kick', beats, 0.9),
        ...pulse('snare', backbeats, 0.6),
        ...pulse(
          'openHat',
          beats.map((beat) => beat + 0.5),
          0.6,
        ),
      ]
    case 'halfTime':
      return [
        ...pulse('kick', [0, ...extraKick], 0.9),
        ...pulse('snare', [2], 0.8),
        ...pulse('hat', halves, 0.4),
      ]
    case 'shaker':
      return [...pulse('shaker', halves, 0.6), ...pulse('kick', [0], 0.7), ...pulse('tom', extraKick, 0.4)]
  }
}

/** The strokes that lead out of a section, in its last bar. */
export function drawFill(random: Random, beatsPerBar: number): PatternHit[] {
  const start = beatsPerBar - random.pick([1, 2])
  const hits: PatternHit[] = []
  for (let beat = start; beat < beatsPerBar; beat += 0.25) {
    if (random.chance(0.7)) {
      hits.push({ beat, drum: random.chance(0.5) ? 'tom' : 'snare', stress: 0.5 + 0.1 * (beat - start) })
    }
  }
  return hits
}
