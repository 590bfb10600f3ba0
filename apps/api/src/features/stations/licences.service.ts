import type { LicenceId, StationId } from '@fieldfare/contracts'
import {
  inTransaction,
  readSociety,
  recordAudit,
  violates,
  type Actor,
  type Database,
  type Transaction,
} from '@fieldfare/database'
import { AppError, notFound } from '../../http/app-error.ts'
import { monthNotOpen } from '../../months/month-not-open.ts'
import { findClosedMonthWithin } from '../../months/closed-months.repository.ts'
import { changedDays } from './changed-days.ts'
import {
  findLicenceWithin,
  findStation,
  insertLicence,
  lockLicence,
  lockStation,
  updateLicenceTerms,
  type LicenceTerms,
  type StationRecord,
} from './stations.repository.ts'

export function createLicencesService({ database }: { database: Database }) {
  /** Licences are changed by administrators, who see every station. */
  async function demand(id: StationId): Promise<StationRecord> {
    const station = await findStation(database, { kind: 'all' }, id)
    if (station === null) throw notFound('This station')
    return station
  }

  async function addLicence(actor: Actor, stationId: StationId, terms: LicenceTerms): Promise<StationRecord> {
    await inTransaction(database, async (trx) => {
      if (!(await lockStation(trx, stationId))) throw notFound('This station')
      await refuseClosedMonths(trx, null, terms)
      await refuseOverlap(trx, stationId, terms, null)
      await insertLicence(trx, stationId, terms)
      await recordAudit(trx, {
        actor,
        action: 'create-licence',
        subjectKind: 'station',
        subjectId: stationId,
        summary: `Added a licence ${await describeTerms(trx, terms)}.`,
      })
    }).catch((error: unknown) => {
      throw violates(error, 'licences_no_overlap')
        ? overlapRefused('Another licence holds some of these days.')
        : error
    })
    return demand(stationId)
  }

  async function changeLicence(actor: Actor, id: LicenceId, terms: LicenceTerms): Promise<StationRecord> {
    const stationId = await inTransaction(database, async (trx) => {
      const before = await lockLicence(trx, id)
      if (before === null) throw notFound('This licence')
      await refuseClosedMonths(trx, before, terms)
      await refuseOverlap(trx, before.stationId, terms, id)
      await updateLicenceTerms(trx, id, terms)
      await recordAudit(trx, {
        actor,
        action: 'update-licence',
        subjectKind: 'station',
        subjectId: before.stationId,
        summary: `Changed a licence from ${await describeTerms(trx, before)} to ${await describeTerms(trx, terms)}.`,
      })
      return before.stationId
    }).catch((error: unknown) => {
      throw violates(error, 'licences_no_overlap')
        ? overlapRefused('Another licence holds some of these days.')
        : error
    })
    return demand(stationId)
  }

  return { add: addLicence, change: changeLicence }
}

function describePeriod(terms: { validFrom: string; validTo: string | null }): string {
  return terms.validTo === null ? `from ${terms.validFrom} on` : `from ${terms.validFrom} to ${terms.validTo}`
}

async function describeTerms(trx: Transaction, terms: LicenceTerms): Promise<string> {
  const { currency, currencyDigits } = await readSociety(trx)
  const padded = terms.monthlyFeeMinor.padStart(currencyDigits + 1, '0')
  const whole = padded.slice(0, padded.length - currencyDigits)
  const amount = currencyDigits === 0 ? whole : `${whole}.${padded.slice(-currencyDigits)}`
  return `${describePeriod(terms)}: ${currency} ${amount} a month, ${terms.worksPartPpm / 10_000} % to works`
}

function overlapRefused(message: string): AppError {
  return new AppError('conflict', { detail: message, fieldErrors: [{ path: 'validFrom', message }] })
}

async function refuseOverlap(
  trx: Transaction,
  stationId: StationId,
  terms: LicenceTerms,
  except: LicenceId | null,
): Promise<void> {
  const held = await findLicenceWithin(trx, stationId, terms, except)
  if (held === null) return
  throw overlapRefused(
    `The licence ${describePeriod(held)} holds some of these days; licences never overlap.`,
  )
}

async function refuseClosedMonths(
  trx: Transaction,
  before: LicenceTerms | null,
  after: LicenceTerms,
): Promise<void> {
  const closed = await findClosedMonthWithin(trx, changedDays(before, after))
  if (closed === null) return
  throw monthNotOpen(closed.month, closed.status, 'A licence cannot change what was paid for that month.')
}
