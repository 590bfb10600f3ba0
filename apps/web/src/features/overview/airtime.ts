export type Airtime = { heldSeconds: number; musicSeconds: number; identifiedSeconds: number }

/** Held airtime in three parts that add up: music identified, music not identified, everything else. */
export function partsOf({ heldSeconds, musicSeconds, identifiedSeconds }: Airtime) {
  return {
    identified: identifiedSeconds,
    // Identified stretches may reach beyond what was heard as music, under speech for example.
    unidentified: Math.max(0, musicSeconds - identifiedSeconds),
    other: Math.max(0, heldSeconds - Math.max(musicSeconds, identifiedSeconds)),
  }
}

/** The share of music that is identified; null where there is no music. */
export function identifiedShare({ musicSeconds, identifiedSeconds }: Airtime): number | null {
  const music = Math.max(musicSeconds, identifiedSeconds)
  return music === 0 ? null : identifiedSeconds / music
}

/** Hours for a chart's axis; the table behind it has the exact figure. */
export function chartHours(seconds: number): number {
  return Math.round(seconds / 36) / 100
}
