import type { JobPayload } from '@fieldfare/contracts'

/** The name of a clip: what the worker stores it under, and the API looks for and offers it by. */
export function clipFileName({ detectionId, source, fromSeconds }: JobPayload<'cut-clip'>): string {
  return `${detectionId}-${source}-${fromSeconds}.mp3`
}

/** Where a clip lies in storage once it was cut. */
export function clipStorageKey(clip: JobPayload<'cut-clip'>): string {
  return `clips/${clipFileName(clip)}`
}
