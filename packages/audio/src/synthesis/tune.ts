import type { Instrument, Part } from './instruments.ts'

export type { Part }

/** Scales the generated tunes use. */
export type Mode = 'major' | 'minor' | 'dorian' | 'mixolydian'

/** One note as it is played, timing already humanised. */
export type Note = {
  readonly part: Part
  readonly startSeconds: number
  readonly durationSeconds: number
  /** MIDI numbering: 69 is the tuning note A4. */
  readonly pitch: number
  /** 0 … 1. */
  readonly velocity: number
}

/** A percussion instrument. */
export type Drum = 'kick' | 'snare' | 'hat' | 'openHat' | 'tom' | 'shaker'

/** One stroke on a drum. */
export type DrumHit = { readonly drum: Drum; readonly startSeconds: number; readonly velocity: number }

/** What a stretch of a tune is for. */
export type SectionName = 'intro' | 'verse' | 'chorus' | 'bridge' | 'outro'

/** A stretch of a tune with its own harmony. */
export type Section = {
  readonly name: SectionName
  readonly startSeconds: number
  readonly bars: number
  /** Semitones above the key of the first section: a last chorus may be lifted. */
  readonly transposition: number
}

/** A generated piece of music: everything {@link renderTune} needs, and what a test can check it against. */
export type Tune = {
  readonly seed: number
  readonly beatsPerMinute: number
  readonly beatsPerBar: 3 | 4
  /** Pitch class of the key note, 0 = C. */
  readonly tonic: number
  readonly mode: Mode
  /** Frequency of A4. Bands are not all tuned alike. */
  readonly tuningHz: number
  readonly sections: readonly Section[]
  /** In order of time. */
  readonly notes: readonly Note[]
  /** In order of time. */
  readonly drumHits: readonly DrumHit[]
  readonly instruments: { readonly [Name in Part]: Instrument }
  readonly levels: { readonly [Name in Part | 'drums']: number }
  readonly echo: { readonly delaySeconds: number; readonly level: number }
  /** The last sound has died away by then. */
  readonly durationSeconds: number
}

/** Frequency of a pitch of this tune. */
export function pitchToHz(pitch: number, tuningHz: number): number {
  return tuningHz * 2 ** ((pitch - 69) / 12)
}
