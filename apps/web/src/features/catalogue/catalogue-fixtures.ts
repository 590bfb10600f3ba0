import {
  partyViewSchema,
  recordingViewSchema,
  type PartyView,
  type RecordingView,
} from '@fieldfare/contracts'

export const quim: PartyView = partyViewSchema.parse({
  id: '10000000-0000-4000-8000-000000000001',
  name: 'Quim Publishing',
  ipi: '00014107338',
  ipiCheckOk: true,
  works: 1,
  recordings: 1,
  canEdit: true,
})

export const wharf: PartyView = partyViewSchema.parse({
  ...quim,
  id: '10000000-0000-4000-8000-000000000002',
  name: 'Wharf Songs',
})

/** A recording of which one party holds a half. */
export function recordingWith(changes: Partial<RecordingView>): RecordingView {
  return recordingViewSchema.parse({
    id: '20000000-0000-4000-8000-000000000001',
    isrc: 'PTA6Q2000047',
    isrcWarning: null,
    title: 'First light',
    artist: 'Marta Quim',
    durationSeconds: 187,
    work: null,
    referenceStatus: 'ready',
    shares: {
      items: [
        {
          id: '30000000-0000-4000-8000-000000000001',
          party: { id: quim.id, name: quim.name },
          sharePpm: 500_000,
          validFrom: '2020-01-01',
          validTo: null,
        },
      ],
      totalTodayPpm: 500_000,
    },
    plays: 3,
    playedSeconds: 561,
    lastPlayedAt: '2026-11-12T08:14:01Z',
    canEdit: true,
    ...changes,
  })
}
