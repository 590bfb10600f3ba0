import type { LocalDate } from '@fieldfare/contracts'

export type HeldParty = { id: string; name: string; ipi: string | null }
export type HeldWork = { id: string; title: string; iswc: string | null }
export type HeldRecording = {
  id: string
  isrc: string
  title: string
  artist: string
  durationMs: number | null
  workId: string | null
}
export type HeldShare = {
  id: string
  workId: string | null
  recordingId: string | null
  partyId: string
  sharePpm: number
  validFrom: LocalDate
  validTo: LocalDate | null
}

/** What the catalogue holds of everything the rows of a file may touch. */
export type CatalogueState = {
  parties: readonly HeldParty[]
  works: readonly HeldWork[]
  recordings: readonly HeldRecording[]
  shares: readonly HeldShare[]
}

/** Names are compared as people read them. */
export function nameKey(name: string): string {
  return name.normalize('NFKC').trim().toLowerCase()
}
