import { chordDegrees } from './harmony.ts'
import type { Random } from './random.ts'

/** A note of a melody before it has a key: beats from the start of the section, and a scale degree. */
export type MelodyNote = {
  readonly startBeat: number
  readonly beats: number
  readonly degree: number
  /** 0 … 1, how much it is leaned on. */
  readonly stress: number
}

type RhythmNote = { readonly startBeat: number; readonly beats: number }

/** Note lengths in beats that a bar is filled with; a livelier melody draws the shorter ones more often. */
const LONG_LENGTHS = [1, 1, 2, 1.5, 0.5, 1]
const SHORT_LENGTHS = [0.5, 0.5, 1, 0.5, 0.75, 0.25, 1.5]

function drawRhythm(random: Random, beats: number, liveliness: number, restChance: number): RhythmNote[] {
  const notes: RhythmNote[] = []
  let beat = random.chance(0.25) ? 0.5 : 0
  while (beat < beats - 0.2) {
    const wanted = random.pick(random.chance(liveliness) ? SHORT_LENGTHS : LONG_LENGTHS)
    const length = Math.min(wanted, beats - beat)
    // Quarter-beat notes come in pairs, so that the beat is found again.
    const isPair = length === 0.25 && beat + 0.5 <= beats
    if (isPair) notes.push({ startBeat: beat, beats: 0.25 })
    const start = isPair ? beat + 0.25 : beat
    if (notes.length === 0 || !random.chance(restChance)) notes.push({ startBeat: start, beats: length })
    beat = start + length
  }
  return notes
}

function nearestChordTone(root: number, degree: number): number {
  let best = degree
  let distance = Infinity
  for (const tone of chordDegrees(root)) {
    const candidate = tone + 7 * Math.round((degree - tone) / 7)
    const away = Math.abs(candidate - degree)
    if (away < distance) {
      best = candidate
      distance = away
    }
  }
  return best
}

/** How a melody moves; drawn once for a tune, so that all its sections belong together. */
export type MelodyStyle = {
  readonly liveliness: number
  readonly restChance: number
  /** How often it leaps instead of stepping. */
  readonly leapChance: number
}

/** Draws the way a tune's melodies move. */
export function drawMelodyStyle(random: Random): MelodyStyle {
  return {
    liveliness: random.between(0.15, 0.85),
    restChance: random.between(0.02, 0.2),
    leapChance: random.between(0.08, 0.4),
  }
}

type PhraseRequest = {
  readonly rhythm: readonly RhythmNote[]
  readonly roots: readonly number[]
  readonly beatsPerBar: number
  readonly centre: number
  readonly startBeat: number
  readonly startDegree: number
}

/** Sets pitches to a rhythm: chord tones on strong beats, steps and a few leaps between, drawn back to the centre. */
function drawPhrase(random: Random, style: MelodyStyle, request: PhraseRequest): MelodyNote[] {
  const { rhythm, roots, beatsPerBar, centre, startBeat } = request
  let degree = request.startDegree
  let direction = random.chance(0.6) ? 1 : -1
  return rhythm.map((note) => {
    const root = roots[Math.floor(note.startBeat / beatsPerBar)] ?? 0
    const isStrong = note.startBeat % beatsPerBar === 0 || (note.beats >= 1 && note.startBeat % 1 === 0)
    if (random.chance(0.35) || Math.abs(degree - centre) > 5) direction = degree > centre ? -1 : 1
    const stride = random.chance(style.leapChance) ? random.integer(2, 4) : random.chance(0.15) ? 0 : 1
    degree += direction * stride
    if (isStrong) degree = nearestChordTone(root, degree)
    return { startBeat: startBeat + note.startBeat, beats: note.beats, degree, stress: isStrong ? 1 : 0.8 }
  })
}

/**
 * A melody over a progression, in two-bar phrases on a common rhythm: the first phrase comes back, the third differs,
 * the last one comes to rest.
 * @param centre scale degree around which it moves
 */
export function drawMelody(
  random: Random,
  style: MelodyStyle,
  progression: readonly number[],
  beatsPerBar: number,
  centre: number,
): MelodyNote[] {
  const phraseBars = 2
  const phraseBeats = phraseBars * beatsPerBar
  const motif = drawRhythm(random, phraseBeats, style.liveliness, style.restChance)
  const contrast = drawRhythm(random, phraseBeats, style.liveliness * 0.8, style.restChance)
  const notes: MelodyNote[] = []
  for (let bar = 0; bar < progression.length; bar += phraseBars) {
    const phrase = bar / phraseBars
    const isLast = bar + phraseBars >= progression.length
    const rhythm = phrase % 4 === 2 ? contrast : motif
    const request = {
      rhythm: isLast ? restAtEnd(rhythm, phraseBeats) : rhythm,
      roots: progression.slice(bar, bar + phraseBars),
      beatsPerBar,
      centre: centre + (phrase % 4 === 2 ? 2 : 0),
      startBeat: bar * beatsPerBar,
      startDegree: centre + random.integer(-1, 1),
    }
    // Phrases of one shape share a seed of chance, so that the melody is recognised when it returns.
    notes.push(...drawPhrase(random.branch(`shape ${phrase % 4 === 2 ? 2 : phrase % 2}`), style, request))
  }
  return notes
}

function restAtEnd(rhythm: readonly RhythmNote[], beats: number): RhythmNote[] {
  const kept = rhythm.filter((note) => note.startBeat < beats - 2)
  return [...kept, { startBeat: beats - 2, beats: 1.75 }]
}
