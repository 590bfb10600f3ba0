import { stationLogIdSchema } from '@fieldfare/contracts'
import { describe, expect, it } from 'vitest'
import type { FoundDetection } from '../engine/messages.ts'
import { describeDetections } from './detections.ts'

const log = {
  id: stationLogIdSchema.parse('3f0c2a52-6c3c-4f0e-9f77-0d5f4f3f9b11'),
  startedAt: new Date('2026-10-25T00:30:00Z'),
}

function found(recordingNumber: number, startSeconds: number, endSeconds: number): FoundDetection {
  return {
    recordingNumber,
    startSeconds,
    endSeconds,
    referenceStartSeconds: 1.5,
    speedRatio: 1,
    confidence: 40,
    expectedFalseAlarms: 1e-40,
    decision: 'accept',
    agreeingHashes: 100,
    evidence: [{ logSeconds: 12.345678, referenceSeconds: 1.98765 }],
  }
}

describe('describeDetections', () => {
  it('places a detection in time from the start of its log', () => {
    const [row] = describeDetections(log, 'e1', [found(7, 12.3456, 80)])
    expect(row).toMatchObject({
      logStartMs: 12_346,
      logEndMs: 80_000,
      startedAt: new Date('2026-10-25T00:30:12.346Z'),
      endedAt: new Date('2026-10-25T00:31:20Z'),
      evidence: [{ logSeconds: 12.346, referenceSeconds: 1.988 }],
    })
  })

  it('names the same run by the same ids, and another engine or place by others', () => {
    const ids = (engine: string, seconds: number) =>
      describeDetections(log, engine, [found(7, seconds, 80)]).map(({ id }) => id)
    expect(ids('e1', 12)).toEqual(ids('e1', 12))
    expect(ids('e1', 12)).not.toEqual(ids('e2', 12))
    expect(ids('e1', 12)).not.toEqual(ids('e1', 13))
  })

  it('begins a repeated recording where it ended before, and moves its reference with it', () => {
    const rows = describeDetections(log, 'e1', [found(7, 0, 60), found(8, 30, 90), found(7, 59.5, 120)])
    expect(rows.map(({ logStartMs, logEndMs }) => [logStartMs, logEndMs])).toEqual([
      [0, 60_000],
      [30_000, 90_000],
      [60_000, 120_000],
    ])
    expect(rows.map(({ referenceStartMs }) => referenceStartMs)).toEqual([1500, 1500, 2000])
  })
})
