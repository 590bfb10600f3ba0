import { listFingerprintsAfter, type Database } from '@fieldfare/database'
import { ENGINE_VERSION } from '@fieldfare/fingerprint'
import type { IndexChange } from './messages.ts'
import type { ThreadPool } from './thread-pool.ts'

/** What a worker process holds of the reference catalogue: one copy, shared by its threads. */
export type ReferenceCatalogue = {
  /** Loads what came since the last call and gives the whole history of changes. */
  refresh: () => Promise<readonly IndexChange[]>
  readonly recordingCount: number
  readonly byteLength: number
}

const FINGERPRINTS_PER_SEGMENT = 500

/** Starts empty; the first refresh loads everything. */
export function createReferenceCatalogue(database: Database, pool: ThreadPool): ReferenceCatalogue {
  const changes: IndexChange[] = []
  const present = new Set<number>()
  let byteLength = 0
  let sequence = 0n
  let underWay: Promise<void> = Promise.resolve()

  async function loadNext(): Promise<boolean> {
    const rows = await listFingerprintsAfter(database, ENGINE_VERSION, sequence, FINGERPRINTS_PER_SEGMENT)
    const last = rows.at(-1)
    if (last === undefined) return false
    // A recording may have been sent again: its newest reference counts.
    const newest = new Map(rows.map((row) => [row.recordingNumber, row.landmarks]))
    const entries = [...newest].map(([recordingNumber, landmarks]) => ({ recordingNumber, landmarks }))
    const segment = await pool.buildSegment(entries)
    for (const recordingNumber of newest.keys()) {
      if (present.has(recordingNumber)) changes.push({ kind: 'remove', recordingNumber })
      present.add(recordingNumber)
    }
    changes.push({ kind: 'add', segment })
    byteLength += segment.data.byteLength
    sequence = last.sequence
    return true
  }

  async function loadAll(): Promise<void> {
    while (await loadNext()) {
      // Each round is one segment.
    }
  }

  return {
    async refresh() {
      // One load at a time; whoever comes during one waits for a load of their own, so nothing newer is missed.
      underWay = underWay.then(loadAll, loadAll)
      await underWay
      return changes
    },
    get recordingCount() {
      return present.size
    },
    get byteLength() {
      return byteLength
    },
  }
}
