import {
  drawBassPattern,
  drawChordPattern,
  drawDrumPattern,
  drawDrumStyle,
  drawFill,
  type PatternHit,
  type PatternNote,
} from './accompaniment.ts'
import { chordDegrees, degreeToSemitones, drawProgression } from './harmony.ts'
import { drawInstruments } from './instruments.ts'
import { drawMelody, drawMelodyStyle, type MelodyNote } from './melody.ts'
import { createRandom, type Random } from './random.ts'
import type { DrumHit, Mode, Note, Part, Section, SectionName, Tune } from './tune.ts'

/** What is played in all sections of one name. */
type Material = {
  readonly progression: readonly number[]
  readonly melody: readonly MelodyNote[]
  readonly chords: readonly PatternNote[]
  readonly bass: readonly PatternNote[]
  readonly drums: readonly PatternHit[]
  readonly parts: ReadonlySet<Part | 'drums'>
  readonly loudness: number
}

const SHORTEST_SECONDS = 122
const LONGEST_SECONDS = 150
const BARS: { readonly [Name in SectionName]: number } = {
  intro: 4,
  verse: 8,
  chorus: 8,
  bridge: 8,
  outro: 4,
}
/** Between intro and outro; as much of it is played as the length of the tune asks for. */
const FORM: readonly SectionName[] = [
  ...(['verse', 'chorus', 'verse', 'chorus', 'bridge', 'chorus'] as const),
  ...(['verse', 'chorus', 'bridge', 'verse', 'chorus', 'chorus'] as const),
]
const ALL_PARTS = new Set<Part | 'drums'>(['melody', 'chords', 'bass', 'pad', 'drums'])
/** Lowest pitch each part's scale is counted from. */
const BASE_PITCH: { readonly [Name in Part]: number } = { melody: 60, chords: 48, bass: 36, pad: 48 }
const TIMING_SPREAD_SECONDS = 0.009
const FINAL_RING_SECONDS = 2.5

function drawMaterials(random: Random, mode: Mode, beatsPerBar: 3 | 4) {
  const style = drawMelodyStyle(random)
  const drumStyle = drawDrumStyle(random)
  const centre = random.integer(2, 5)
  const material = (name: SectionName, first: number, lift: number, parts = ALL_PARTS): Material => {
    const own = random.branch(name)
    const progression = drawProgression(own, mode, 4, first)
    const long =
      BARS[name] > 4 ? [...progression.slice(0, 3), own.pick([3, 4, 5]), ...progression] : progression
    return {
      progression: long,
      melody: drawMelody(own, style, long, beatsPerBar, centre + lift),
      chords: drawChordPattern(own, beatsPerBar),
      bass: drawBassPattern(own, beatsPerBar),
      drums: drawDrumPattern(own, drumStyle, beatsPerBar),
      parts,
      loudness: name === 'chorus' ? 1 : name === 'intro' ? 0.8 : 0.88,
    }
  }
  const someParts = (...names: (Part | 'drums')[]) => new Set(names)
  return {
    intro: material('intro', 0, 0, someParts('chords', 'bass', random.chance(0.5) ? 'melody' : 'drums')),
    verse: material('verse', 0, 0, someParts('melody', 'chords', 'bass', 'drums')),
    chorus: material('chorus', random.pick([0, 3, 5]), 2),
    bridge: material('bridge', random.pick([3, 5, 1]), 1, someParts('melody', 'pad', 'bass', 'drums')),
    outro: material('outro', 0, 0, someParts('melody', 'chords', 'bass', 'pad')),
  } satisfies { [Name in SectionName]: Material }
}

/** As many sections as come nearest to the length asked for. */
function planSections(random: Random, barSeconds: number): Section[] {
  const target = random.between(SHORTEST_SECONDS, LONGEST_SECONDS) - FINAL_RING_SECONDS
  const bodyBars = (target / barSeconds - BARS.intro - BARS.outro) / 8
  const count = Math.max(3, Math.min(FORM.length, Math.round(bodyBars)))
  const names: SectionName[] = ['intro', ...FORM.slice(0, count), 'outro']
  const lift = random.chance(0.3) ? random.pick([1, 2]) : 0
  const lastChorus = names.lastIndexOf('chorus')
  let startSeconds = 0
  return names.map((name, index) => {
    const section: Section = {
      name,
      startSeconds,
      bars: BARS[name],
      transposition: index >= lastChorus ? lift : 0,
    }
    startSeconds += section.bars * barSeconds
    return section
  })
}

type Score = {
  readonly random: Random
  readonly mode: Mode
  readonly tonic: number
  readonly beatSeconds: number
  readonly beatsPerBar: number
  /** How late the second half of a beat comes, as a share of the beat. */
  readonly swing: number
}

/** Swung, slightly uneven time of a beat of a section. */
function playedAt(score: Score, section: Section, beat: number): number {
  const within = beat - Math.floor(beat)
  const swung = within === 0.5 ? beat + score.swing : beat
  const unevenness = score.random.between(-TIMING_SPREAD_SECONDS, TIMING_SPREAD_SECONDS)
  return Math.max(0, section.startSeconds + swung * score.beatSeconds + unevenness)
}

function playNote(score: Score, section: Section, part: Part, note: PlannedNote): Note {
  const base = BASE_PITCH[part] + score.tonic + section.transposition
  return {
    part,
    startSeconds: playedAt(score, section, note.beat),
    durationSeconds: note.beats * score.beatSeconds,
    pitch: base + degreeToSemitones(score.mode, note.degree),
    velocity: Math.min(1, note.stress * score.random.between(0.88, 1.05)),
  }
}

type PlannedNote = { beat: number; beats: number; degree: number; stress: number }

/** Keeps a chord within one octave, so that its notes move little from chord to chord. */
function closeVoicing(degree: number): number {
  return degree >= 7 ? degree - 7 : degree
}

function playBar(score: Score, section: Section, material: Material, bar: number): Note[] {
  const { beatsPerBar } = score
  const root = material.progression[bar % material.progression.length] ?? 0
  const firstBeat = bar * beatsPerBar
  const notes: Note[] = []
  const add = (part: Part, pattern: readonly PatternNote[], place: (degree: number) => number) => {
    if (!material.parts.has(part)) return
    for (const { beat, beats, steps, stress } of pattern) {
      for (const step of steps) {
        const degree = place(root + step)
        const loudness = stress * material.loudness
        notes.push(
          playNote(score, section, part, { beat: firstBeat + beat, beats, degree, stress: loudness }),
        )
      }
    }
  }
  add('bass', material.bass, (degree) => (root > 3 ? degree - 7 : degree))
  add('chords', material.chords, closeVoicing)
  const held = { beat: 0, beats: beatsPerBar, steps: chordDegrees(0), stress: 0.8 }
  add('pad', [held], (degree) => closeVoicing(degree) + 7)
  return notes
}

function playSection(score: Score, section: Section, material: Material): Note[] {
  const notes: Note[] = []
  for (let bar = 0; bar < section.bars; bar++) notes.push(...playBar(score, section, material, bar))
  if (!material.parts.has('melody')) return notes
  for (const { startBeat, beats, degree, stress } of material.melody) {
    const planned = { beat: startBeat, beats: beats * 0.95, degree, stress: stress * material.loudness }
    notes.push(playNote(score, section, 'melody', planned))
  }
  return notes
}

function playDrums(score: Score, section: Section, material: Material): DrumHit[] {
  if (!material.parts.has('drums') || material.drums.length === 0) return []
  const hits: DrumHit[] = []
  for (let bar = 0; bar < section.bars; bar++) {
    const fill = bar === section.bars - 1 ? drawFill(score.random, score.beatsPerBar) : []
    for (const { drum, beat, stress } of [...material.drums, ...fill]) {
      hits.push({
        drum,
        startSeconds: playedAt(score, section, bar * score.beatsPerBar + beat),
        velocity: stress * material.loudness * score.random.between(0.85, 1.05),
      })
    }
  }
  return hits
}

/** The chord a tune ends on, left to ring. */
function playEnding(score: Score, section: Section): Note[] {
  const beat = section.bars * score.beatsPerBar
  const beats = 1.6 / score.beatSeconds
  const parts: [Part, readonly number[]][] = [
    ['bass', [0]],
    ['chords', chordDegrees(0)],
    ['melody', [7]],
  ]
  return parts.flatMap(([part, degrees]) =>
    degrees.map((degree) => playNote(score, section, part, { beat, beats, degree, stress: 0.85 })),
  )
}

const byTime = (a: { startSeconds: number }, b: { startSeconds: number }) => a.startSeconds - b.startSeconds

/**
 * Composes a tune of two to two and a half minutes: key, mode, tempo, chords, melody, bass, drums, form and the band
 * that plays it all follow from the seed, and the same seed always gives the same tune.
 */
export function composeTune(seed: number): Tune {
  const random = createRandom(seed)
  const beatsPerBar = random.chance(0.2) ? 3 : 4
  const beatsPerMinute = Math.round(random.between(74, 150))
  const mode = random.pick(['major', 'major', 'minor', 'minor', 'dorian', 'mixolydian'] as const)
  const tonic = random.integer(0, 11)
  const beatSeconds = 60 / beatsPerMinute
  const swing = random.chance(0.3) ? random.between(0.08, 0.17) : 0
  const score: Score = { random: random.branch('play'), mode, tonic, beatSeconds, beatsPerBar, swing }
  const materials = drawMaterials(random.branch('materials'), mode, beatsPerBar)
  const sections = planSections(random.branch('form'), beatSeconds * beatsPerBar)
  const notes = sections.flatMap((section) => playSection(score, section, materials[section.name]))
  const drumHits = sections.flatMap((section) => playDrums(score, section, materials[section.name]))
  const last = sections[sections.length - 1]
  if (last) notes.push(...playEnding(score, last))
  const endOfBars = last ? last.startSeconds + last.bars * beatsPerBar * beatSeconds : 0
  return {
    seed,
    beatsPerMinute,
    beatsPerBar,
    tonic,
    mode,
    tuningHz: random.between(436, 445),
    sections,
    notes: notes.sort(byTime),
    drumHits: drumHits.sort(byTime),
    instruments: drawInstruments(random.branch('band')),
    levels: {
      melody: random.between(0.85, 1.05),
      chords: random.between(0.3, 0.42),
      bass: random.between(0.6, 0.8),
      pad: random.between(0.12, 0.2),
      drums: random.between(0.5, 0.85),
    },
    echo: { delaySeconds: beatSeconds * random.pick([0.5, 0.75, 1]), level: random.between(0.05, 0.22) },
    durationSeconds: endOfBars + FINAL_RING_SECONDS,
  }
}
