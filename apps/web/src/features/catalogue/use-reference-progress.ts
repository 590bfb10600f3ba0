import type { ReferenceAudioView } from '@fieldfare/contracts'
import { useState } from 'react'
import { useServerEvents } from '../../lib/server-events.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'

export type ReferenceFractions = ReadonlyMap<string, number | null>

/** Follows fingerprints live: how far each is, and fresh lists when one changes its state. */
export function useReferenceProgress(): ReferenceFractions {
  const [fractions, setFractions] = useState<ReferenceFractions>(new Map())
  const [states, setStates] = useState<ReadonlyMap<string, ReferenceAudioView['status']>>(new Map())
  useServerEvents((event, queryClient) => {
    if (event.kind !== 'reference-progress') return
    setFractions((known) => new Map(known).set(event.referenceAudioId, event.fraction))
    if (states.get(event.referenceAudioId) === event.status) return
    setStates((known) => new Map(known).set(event.referenceAudioId, event.status))
    void refreshScopes(queryClient, 'reference-audio', 'recordings')
  })
  return fractions
}
