import {
  detectionDetailSchema,
  detectionViewSchema,
  monthOverviewSchema,
  playViewSchema,
  stationLogViewSchema,
  stationViewSchema,
  type DetectionDetail,
  type DetectionView,
  type MonthOverview,
  type PlayView,
  type StationLogView,
  type StationView,
} from '@fieldfare/contracts'

/** A readable identifier: the same number gives the same one. */
export function idOf(number: number): string {
  return `00000000-0000-4000-8000-${String(number).padStart(12, '0')}`
}

export const stationRef = {
  id: idOf(1),
  callName: 'KESTREL',
  name: 'Kestrel Valley',
  timeZone: 'Europe/Lisbon',
}

const recordingRef = {
  id: idOf(2),
  isrc: 'QZFFR2600042',
  title: 'Hedgerow Morning',
  artist: 'The Lapwing Trio',
}

export function stationView(extra: Partial<StationView> = {}): StationView {
  return stationViewSchema.parse({
    ...stationRef,
    contactEmail: 'logs@kestrel.example',
    licences: [
      {
        id: idOf(3),
        validFrom: '2026-01-01',
        validTo: null,
        monthlyFeeMinor: '412500',
        worksPartPpm: 600_000,
      },
    ],
    canUpload: true,
    canEdit: false,
    ...extra,
  })
}

export function logView(extra: Partial<Record<keyof StationLogView, unknown>> = {}): StationLogView {
  return stationLogViewSchema.parse({
    id: idOf(10),
    station: stationRef,
    fileName: '2026-11-03_06-00.wav',
    sizeBytes: 634_000_000,
    format: 'WAV, PCM 16 bit, 44.1 kHz',
    startedAt: '2026-11-03T06:00:00Z',
    endedAt: '2026-11-03T07:00:00Z',
    durationSeconds: 3600,
    status: 'analysed',
    progress: null,
    failure: null,
    warnings: [],
    uploadedByName: 'Ines Calder',
    uploadedAt: '2026-11-03T08:10:00Z',
    analysedAt: '2026-11-03T08:12:00Z',
    musicSeconds: 2700,
    speechSeconds: 700,
    silenceSeconds: 20,
    identifiedSeconds: 2400,
    detections: 11,
    canAnalyseAgain: false,
    ...extra,
  })
}

export function detectionView(extra: Partial<Record<keyof DetectionView, unknown>> = {}): DetectionView {
  return detectionViewSchema.parse({
    id: idOf(20),
    station: stationRef,
    logId: idOf(10),
    recording: recordingRef,
    startedAt: '2026-11-03T06:12:30Z',
    endedAt: '2026-11-03T06:15:51Z',
    durationSeconds: 201,
    confidence: 14.2,
    expectedFalseAlarms: 6.3e-15,
    decision: 'review',
    reviewState: 'waiting',
    play: null,
    openDisputeId: null,
    ...extra,
  })
}

export function detectionDetail(
  extra: Partial<Record<keyof DetectionDetail, unknown>> = {},
): DetectionDetail {
  return detectionDetailSchema.parse({
    ...detectionView(),
    logStartSeconds: 750,
    referenceStartSeconds: 2,
    speedRatio: 1,
    agreeingHashes: 640,
    engineVersion: '1.0.0',
    evidence: Array.from({ length: 120 }, (_, index) => ({
      logSeconds: 752 + index * 1.6,
      referenceSeconds: 4 + index * 1.6 + (index % 5) * 0.01,
    })),
    hasReferenceAudio: true,
    history: [],
    disputes: [],
    isMonthOpen: true,
    canReview: true,
    canDispute: false,
    ...extra,
  })
}

export function playView(extra: Partial<Record<keyof PlayView, unknown>> = {}): PlayView {
  return playViewSchema.parse({
    id: idOf(30),
    detectionId: idOf(20),
    station: stationRef,
    recording: recordingRef,
    work: { id: idOf(31), title: 'Hedgerow Morning', iswc: 'T9100000011' },
    startedAt: '2026-11-03T06:12:30Z',
    endedAt: '2026-11-03T06:15:51Z',
    durationSeconds: 201,
    localDay: '2026-11-03',
    status: 'counted',
    isInDispute: false,
    canDispute: false,
    ...extra,
  })
}

export function pageOfRows<Row>(items: Row[]): {
  items: Row[]
  total: number
  page: number
  pageSize: number
} {
  return { items, total: items.length, page: 1, pageSize: 50 }
}

const airtime = { heldSeconds: 43_200, musicSeconds: 28_800, identifiedSeconds: 25_200, plays: 118 }

export function monthOverview(extra: Partial<Record<keyof MonthOverview, unknown>> = {}): MonthOverview {
  return monthOverviewSchema.parse({
    month: '2026-11',
    status: 'open',
    totals: {
      ...airtime,
      expectedSeconds: 86_400,
      waitingForReview: 7,
      openDisputes: 2,
      logsInWork: 1,
      logsRefused: 3,
    },
    stations: [{ station: stationRef, ...airtime, expectedSeconds: 86_400, logs: 12, waitingForReview: 7 }],
    days: [
      { day: '2026-11-01', heldSeconds: 0, musicSeconds: 0, identifiedSeconds: 0, plays: 0 },
      { day: '2026-11-02', ...airtime },
    ],
    hours: Array.from({ length: 24 }, (_, hour) => ({
      hour,
      ...(hour === 6 ? airtime : { heldSeconds: 0, musicSeconds: 0, identifiedSeconds: 0, plays: 0 }),
    })),
    topRecordings: [{ recording: recordingRef, plays: 42, seconds: 8442 }],
    ...extra,
  })
}
