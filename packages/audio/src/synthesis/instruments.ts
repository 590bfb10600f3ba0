import type { Random } from './random.ts'

/** A part of the band; each has its own instrument. */
export type Part = 'melody' | 'chords' | 'bass' | 'pad'

/** How loudness rises, falls, holds and dies away. */
export type Envelope = {
  readonly attackSeconds: number
  /** Time constant of the fall to the sustained level. */
  readonly decaySeconds: number
  /** 0 … 1; 0 for struck and plucked sounds. */
  readonly sustain: number
  readonly releaseSeconds: number
}

/** Harmonics at fixed strengths, duller as the note goes on. */
export type AdditiveTimbre = {
  readonly kind: 'additive'
  /** Strength of each harmonic, the fundamental first. */
  readonly harmonics: readonly number[]
  /** Share of the strength each next harmonic keeps once the note has settled, 0 … 1. */
  readonly dulling: number
  readonly dullingSeconds: number
  readonly vibratoHz: number
  readonly vibratoCents: number
  /** A second voice this far off, for width. */
  readonly detuneCents: number
}

/** One sine wave bending another's phase (Chowning, J. Audio Eng. Soc. 21, 1973). */
export type FmTimbre = {
  readonly kind: 'fm'
  readonly modulatorRatio: number
  readonly index: number
  readonly indexDecaySeconds: number
}

/** A noise burst in a damped loop (Karplus & Strong, Computer Music Journal 7, 1983). */
export type PluckedTimbre = {
  readonly kind: 'plucked'
  /** 0 dull … 1 bright. */
  readonly brightness: number
  readonly ringSeconds: number
  /** Where the string is plucked, as a share of its length. */
  readonly position: number
}

/** A sound of its own: timbre and envelope. */
export type Instrument = {
  readonly timbre: AdditiveTimbre | FmTimbre | PluckedTimbre
  readonly envelope: Envelope
}

type Draw = (random: Random) => Instrument

function drawHarmonics(random: Random, count: number, slope: number, oddness: number): number[] {
  return Array.from({ length: count }, (_, index) => {
    const isEven = index % 2 === 1
    const strength = (index + 1) ** -slope * (isEven ? 1 - oddness : 1)
    return index === 0 ? 1 : strength * random.between(0.35, 1.5)
  })
}

const reed: Draw = (random) => ({
  timbre: {
    kind: 'additive',
    harmonics: drawHarmonics(random, 12, random.between(0.9, 1.4), random.between(0, 0.85)),
    dulling: random.between(0.8, 0.98),
    dullingSeconds: 0.4,
    vibratoHz: random.between(4.6, 6.2),
    vibratoCents: random.between(5, 16),
    detuneCents: 0,
  },
  envelope: { attackSeconds: 0.035, decaySeconds: 0.2, sustain: 0.8, releaseSeconds: 0.08 },
})

const strings: Draw = (random) => ({
  timbre: {
    kind: 'additive',
    harmonics: drawHarmonics(random, 10, random.between(1, 1.5), random.between(0, 0.4)),
    dulling: 0.95,
    dullingSeconds: 0.6,
    vibratoHz: random.between(4.8, 5.8),
    vibratoCents: random.between(3, 8),
    detuneCents: random.between(5, 12),
  },
  envelope: {
    attackSeconds: random.between(0.08, 0.25),
    decaySeconds: 0.5,
    sustain: 0.85,
    releaseSeconds: 0.25,
  },
})

const keys: Draw = (random) => ({
  timbre: {
    kind: 'additive',
    harmonics: drawHarmonics(random, 10, random.between(0.8, 1.4), random.between(0, 0.3)),
    dulling: random.between(0.45, 0.75),
    dullingSeconds: random.between(0.25, 0.6),
    vibratoHz: 0,
    vibratoCents: 0,
    detuneCents: random.between(0, 3),
  },
  envelope: {
    attackSeconds: 0.004,
    decaySeconds: random.between(0.5, 1.2),
    sustain: 0,
    releaseSeconds: 0.12,
  },
})

const organ: Draw = (random) => ({
  timbre: {
    kind: 'additive',
    harmonics: [
      1,
      random.between(0.3, 1),
      random.between(0.1, 0.8),
      random.between(0.2, 0.7),
      0,
      random.between(0, 0.4),
      0,
      random.between(0, 0.4),
    ],
    dulling: 1,
    dullingSeconds: 1,
    vibratoHz: random.between(5.5, 6.8),
    vibratoCents: random.between(2, 6),
    detuneCents: 0,
  },
  envelope: { attackSeconds: 0.012, decaySeconds: 0.3, sustain: 0.9, releaseSeconds: 0.04 },
})

const bells: Draw = (random) => ({
  timbre: {
    kind: 'fm',
    modulatorRatio: random.pick([2, 3, 3.5, 4, 5]),
    index: random.between(0.8, 2.2),
    indexDecaySeconds: random.between(0.15, 0.5),
  },
  envelope: {
    attackSeconds: 0.003,
    decaySeconds: random.between(0.4, 0.9),
    sustain: 0,
    releaseSeconds: 0.25,
  },
})

const brass: Draw = (random) => ({
  timbre: {
    kind: 'fm',
    modulatorRatio: 1,
    index: random.between(1.4, 3),
    indexDecaySeconds: random.between(0.3, 0.9),
  },
  envelope: {
    attackSeconds: random.between(0.03, 0.07),
    decaySeconds: 0.3,
    sustain: 0.7,
    releaseSeconds: 0.09,
  },
})

const guitar: Draw = (random) => ({
  timbre: {
    kind: 'plucked',
    brightness: random.between(0.35, 0.9),
    ringSeconds: random.between(1.2, 3),
    position: random.between(0.12, 0.45),
  },
  envelope: { attackSeconds: 0.002, decaySeconds: 4, sustain: 0.2, releaseSeconds: 0.06 },
})

const roundBass: Draw = (random) => ({
  timbre: {
    kind: 'additive',
    harmonics: drawHarmonics(random, 7, random.between(1.1, 1.9), random.between(0, 0.6)),
    dulling: random.between(0.6, 0.9),
    dullingSeconds: 0.25,
    vibratoHz: 0,
    vibratoCents: 0,
    detuneCents: 0,
  },
  envelope: {
    attackSeconds: 0.008,
    decaySeconds: random.between(0.5, 1.5),
    sustain: 0.35,
    releaseSeconds: 0.06,
  },
})

const fmBass: Draw = (random) => ({
  timbre: {
    kind: 'fm',
    modulatorRatio: random.pick([1, 2]),
    index: random.between(0.6, 1.8),
    indexDecaySeconds: random.between(0.1, 0.4),
  },
  envelope: {
    attackSeconds: 0.005,
    decaySeconds: random.between(0.4, 1),
    sustain: 0.3,
    releaseSeconds: 0.05,
  },
})

const CHOICES: { readonly [Name in Part]: readonly Draw[] } = {
  melody: [reed, strings, keys, bells, brass, guitar, organ, reed],
  chords: [keys, guitar, organ, bells, guitar, keys],
  bass: [roundBass, fmBass, guitar],
  pad: [strings, organ, strings],
}

/** Chooses the band of a tune: an instrument for each part, no two tunes alike. */
export function drawInstruments(random: Random): { readonly [Name in Part]: Instrument } {
  const draw = (part: Part) => random.pick(CHOICES[part])(random.branch(part))
  return { melody: draw('melody'), chords: draw('chords'), bass: draw('bass'), pad: draw('pad') }
}
