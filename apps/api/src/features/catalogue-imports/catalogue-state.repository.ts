import type { Transaction } from '@fieldfare/database'
import type { CatalogueRow } from './catalogue-row.ts'
import {
  nameKey,
  type CatalogueState,
  type HeldParty,
  type HeldRecording,
  type HeldShare,
  type HeldWork,
} from './catalogue-state.ts'

/** One import at a time: two that add the same recording would each be right on its own. */
export async function waitForOtherImports(trx: Transaction): Promise<void> {
  await trx.raw("select pg_advisory_xact_lock(hashtext('catalogue-import'))")
}

const unique = (values: readonly string[]) => [...new Set(values)]

async function loadRecordings(trx: Transaction, rows: readonly CatalogueRow[]): Promise<HeldRecording[]> {
  return trx('recordings')
    .whereRaw('isrc = any(?::text[])', [unique(rows.map(({ isrc }) => isrc))])
    .orderBy('id')
    .forUpdate()
    .select<HeldRecording[]>(
      { id: 'id', isrc: 'isrc', title: 'title', artist: 'artist', workId: 'work_id' },
      trx.raw('duration_ms::float8 as "durationMs"'),
    )
}

async function loadWorks(
  trx: Transaction,
  rows: readonly CatalogueRow[],
  recordings: readonly HeldRecording[],
): Promise<HeldWork[]> {
  const iswcs = unique(rows.flatMap(({ workIswc }) => workIswc ?? []))
  const linked = unique(recordings.flatMap(({ workId }) => workId ?? []))
  return trx('works')
    .whereRaw('iswc = any(?::text[]) or id = any(?::uuid[])', [iswcs, linked])
    .orderBy('id')
    .forUpdate()
    .select<HeldWork[]>('id', 'title', 'iswc')
}

async function loadParties(trx: Transaction, rows: readonly CatalogueRow[]): Promise<HeldParty[]> {
  const shares = rows.flatMap(({ share }) => share ?? [])
  const ipis = unique(shares.flatMap(({ partyIpi }) => partyIpi ?? []))
  const names = unique(shares.map(({ partyName }) => nameKey(partyName)))
  return trx('parties')
    .whereRaw('ipi = any(?::text[]) or lower(trim(normalize(name, NFKC))) = any(?::text[])', [ipis, names])
    .orderBy('id')
    .select<HeldParty[]>('id', 'name', 'ipi')
}

async function loadShares(
  trx: Transaction,
  works: readonly HeldWork[],
  recordings: readonly HeldRecording[],
): Promise<HeldShare[]> {
  return trx('shares')
    .whereRaw('work_id = any(?::uuid[]) or recording_id = any(?::uuid[])', [
      works.map(({ id }) => id),
      recordings.map(({ id }) => id),
    ])
    .select<HeldShare[]>({
      id: 'id',
      workId: 'work_id',
      recordingId: 'recording_id',
      partyId: 'party_id',
      sharePpm: 'share_ppm',
      validFrom: 'valid_from',
      validTo: 'valid_to',
    })
}

/** What the rows may touch. Works and recordings are locked, so that their shares stand still until all is written. */
export async function loadCatalogueState(
  trx: Transaction,
  rows: readonly CatalogueRow[],
): Promise<CatalogueState> {
  const recordings = await loadRecordings(trx, rows)
  const works = await loadWorks(trx, rows, recordings)
  const parties = await loadParties(trx, rows)
  const shares = await loadShares(trx, works, recordings)
  return { recordings, works, parties, shares }
}
