import type { DistributionId, PartyId, Right, StatementId } from '@fieldfare/contracts'
import type { Connection } from '@fieldfare/database'
import { stationReferenceSql, type StationReference } from '../../records/references.ts'

export type StationPart = {
  station: StationReference
  heldMs: bigint
  expectedMs: bigint
  coveredDays: number
  feeMinor: bigint
  netMinor: bigint
}
export type DeductionPart = {
  stationId: string
  code: string
  label: string
  ratePpm: number
  amountMinor: bigint
}
export type PoolPart = {
  stationId: string
  right: Right
  poolMinor: bigint
  plays: number
  creditedMs: bigint
  allocatedMinor: bigint
  heldBackMinor: bigint
}
export type HoldbackPart = {
  station: StationReference
  right: Right
  subject: string
  reasonCode: string
  reason: string
  amountMinor: bigint
}
export type PayeePart = { partyId: PartyId; partyName: string; amountMinor: bigint; statementId: StatementId }

/** Every level of a calculated run, as the worker wrote it. */
export type RunParts = {
  stations: StationPart[]
  deductions: DeductionPart[]
  pools: PoolPart[]
  holdbacks: HoldbackPart[]
  payees: PayeePart[]
}

export async function readRunParts(connection: Connection, id: DistributionId): Promise<RunParts> {
  const stations: StationPart[] = await connection('distribution_stations')
    .join('stations', 'stations.id', 'distribution_stations.station_id')
    .where({ distribution_id: id })
    .orderBy('stations.call_name')
    .select<StationPart[]>(
      {
        heldMs: 'held_ms',
        expectedMs: 'expected_ms',
        coveredDays: 'covered_days',
        feeMinor: 'fee_minor',
        netMinor: 'net_minor',
      },
      connection.raw(`${stationReferenceSql} as station`),
    )
  const deductions: DeductionPart[] = await connection('distribution_deductions')
    .where({ distribution_id: id })
    .orderBy(['station_id', 'position'])
    .select('code', 'label', {
      stationId: 'station_id',
      ratePpm: 'rate_ppm',
      amountMinor: 'amount_minor',
    })
  const pools: PoolPart[] = await connection('distribution_pools')
    .where({ distribution_id: id })
    .orderBy(['station_id', { column: 'right', order: 'desc' }])
    .select('right', 'plays', {
      stationId: 'station_id',
      poolMinor: 'pool_minor',
      creditedMs: 'credited_ms',
      allocatedMinor: 'allocated_minor',
      heldBackMinor: 'held_back_minor',
    })
  const holdbacks: HoldbackPart[] = await connection('distribution_holdbacks')
    .join('stations', 'stations.id', 'distribution_holdbacks.station_id')
    .where({ distribution_id: id })
    .orderBy([
      { column: 'amount_minor', order: 'desc' },
      { column: 'stations.call_name' },
      { column: 'subject' },
      { column: 'distribution_holdbacks.id' },
    ])
    .select<HoldbackPart[]>(
      'right',
      'subject',
      'reason',
      { reasonCode: 'reason_code', amountMinor: 'amount_minor' },
      connection.raw(`${stationReferenceSql} as station`),
    )
  const payees: PayeePart[] = await connection('statements')
    .where({ distribution_id: id })
    .orderBy([{ column: 'net_minor', order: 'desc' }, { column: 'party_name' }, { column: 'party_id' }])
    .select({
      partyId: 'party_id',
      partyName: 'party_name',
      amountMinor: 'net_minor',
      statementId: 'id',
    })
  return { stations, deductions, pools, holdbacks, payees }
}
