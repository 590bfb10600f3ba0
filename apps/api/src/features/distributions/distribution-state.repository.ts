import type { DistributionId, Instant, Month, MonthStatus, UserId } from '@fieldfare/contracts'
import { monthSchema } from '@fieldfare/contracts'
import type { Connection, Transaction } from '@fieldfare/database'
import type { Knex } from 'knex'
import { daysOfMonth } from '../../records/months.ts'

export type RunStatus = 'calculating' | 'calculated' | 'failed' | 'approved' | 'issuing' | 'issued'

/** One calculation of a month that still stands, with its totals once it has ended. */
export type RunRow = {
  id: DistributionId
  month: Month
  run: number
  status: RunStatus
  failure: string | null
  ruleVersion: string
  currency: string
  digest: string | null
  feeMinor: bigint | null
  netMinor: bigint | null
  allocatedMinor: bigint | null
  heldBackMinor: bigint | null
  plays: number | null
  payees: number
  requestedBy: UserId
  requestedByName: string
  calculatedAt: Instant | null
  approvedByName: string | null
  approvedAt: Instant | null
  issuedAt: Instant | null
}

function selectRuns(connection: Connection): Knex.QueryBuilder {
  return connection('distributions')
    .join('users as requester', 'requester.id', 'distributions.requested_by')
    .leftJoin('users as approver', 'approver.id', 'distributions.approved_by')
    .whereNot('distributions.status', 'withdrawn')
    .select(
      {
        id: 'distributions.id',
        run: 'distributions.run',
        status: 'distributions.status',
        failure: 'distributions.failure',
        ruleVersion: 'distributions.rules_version',
        currency: 'distributions.currency',
        digest: 'distributions.digest',
        feeMinor: 'distributions.fee_minor',
        netMinor: 'distributions.net_minor',
        allocatedMinor: 'distributions.allocated_minor',
        heldBackMinor: 'distributions.held_back_minor',
        plays: 'distributions.plays',
        requestedBy: 'distributions.requested_by',
        requestedByName: 'requester.name',
        calculatedAt: 'distributions.calculated_at',
        approvedByName: 'approver.name',
        approvedAt: 'distributions.approved_at',
        issuedAt: 'distributions.issued_at',
      },
      connection.raw(`to_char(distributions.month, 'YYYY-MM') as month`),
      connection.raw(
        '(select count(*)::int from statements where distribution_id = distributions.id) as payees',
      ),
    )
    .whereRaw(
      'distributions.run = (select max(run) from distributions as latest where latest.month = distributions.month)',
    )
}

/** Names the one job that makes the statements of a run. */
export function issueJobKey(id: DistributionId): string {
  return `render-statements-${id}`
}

async function fetchRows<Row>(query: PromiseLike<Row[]>): Promise<Row[]> {
  return query
}

/** The last run of a month, null when there is none or it was withdrawn. */
export async function findRun(connection: Connection, month: Month): Promise<RunRow | null> {
  const query = selectRuns(connection).where('distributions.month', daysOfMonth(month).firstDay)
  const [row] = await fetchRows<RunRow>(query)
  return row ?? null
}

/** The last run of every month that has one which was not withdrawn. */
export async function listRuns(connection: Connection): Promise<RunRow[]> {
  return fetchRows<RunRow>(selectRuns(connection))
}

/** Why the statements of a run could not be made; null while that has not failed. */
export async function findIssueFailure(connection: Connection, id: DistributionId): Promise<string | null> {
  const row: { reason: string } | undefined = await connection('jobs')
    .where({ dedupe_key: issueJobKey(id), status: 'failed' })
    .first({ reason: 'error_message' })
  return row?.reason ?? null
}

/** Months with counted plays or with a distribution, newest first. */
export async function listDistributionMonths(
  connection: Connection,
): Promise<{ month: Month; status: MonthStatus }[]> {
  const { rows } = await connection.raw<{ rows: { month: Month; status: MonthStatus }[] }>(
    `with months as (
       select generate_series(date_trunc('month', (select min(local_day) from plays)),
         (select max(local_day) from plays), interval '1 month')::date as month
     ),
     listed as (
       select month from months where exists (
         select from plays where local_day >= months.month and local_day < months.month + interval '1 month')
       union
       select month from distributions
     )
     select to_char(listed.month, 'YYYY-MM') as month, coalesce(distribution_months.status, 'open') as status
     from listed left join distribution_months using (month)
     order by listed.month desc`,
  )
  return rows.map(({ month, status }) => ({ month: monthSchema.parse(month), status }))
}

/** Locks the month: its steps are taken one after the other, whoever takes them. */
export async function lockMonth(trx: Transaction, month: Month): Promise<MonthStatus> {
  const { firstDay } = daysOfMonth(month)
  await trx('distribution_months').insert({ month: firstDay }).onConflict('month').ignore()
  const row: { status: MonthStatus } | undefined = await trx('distribution_months')
    .where({ month: firstDay })
    .forUpdate()
    .first('status')
  return row?.status ?? 'open'
}

export async function setMonthStatus(trx: Transaction, month: Month, status: MonthStatus): Promise<void> {
  await trx('distribution_months')
    .where({ month: daysOfMonth(month).firstDay })
    .update({ status })
}

/** The version of the rules valid on the first day of the month. */
export async function findRulesVersion(connection: Connection, month: Month): Promise<string | null> {
  const row: { version: string } | undefined = await connection('distribution_rules')
    .where('valid_from', '<=', daysOfMonth(month).firstDay)
    .orderBy('valid_from', 'desc')
    .first('version')
  return row?.version ?? null
}

export async function insertRun(
  trx: Transaction,
  run: { month: Month; rulesVersion: string; currency: string; currencyDigits: number; requestedBy: UserId },
): Promise<DistributionId> {
  const { firstDay } = daysOfMonth(run.month)
  const rows: { id: DistributionId }[] = await trx('distributions')
    .insert({
      month: firstDay,
      run: trx.raw('(select coalesce(max(run), 0) + 1 from distributions where month = ?)', [firstDay]),
      rules_version: run.rulesVersion,
      currency: run.currency,
      currency_digits: run.currencyDigits,
      requested_by: run.requestedBy,
    })
    .returning('id')
  const [row] = rows
  if (row === undefined) throw new Error('The new run came back without an id')
  return row.id
}

/** Runs that ended badly stay as they are; the one that stands is withdrawn. */
export async function withdrawRun(trx: Transaction, month: Month): Promise<void> {
  await trx('distributions')
    .where({ month: daysOfMonth(month).firstDay })
    .whereIn('status', ['calculating', 'calculated', 'approved'])
    .update({ status: 'withdrawn', approved_by: null, approved_at: null })
}

export async function approveRun(trx: Transaction, id: DistributionId, approvedBy: UserId): Promise<void> {
  await trx('distributions')
    .where({ id })
    .update({ status: 'approved', approved_by: approvedBy, approved_at: trx.fn.now() })
}

export async function startIssuing(trx: Transaction, id: DistributionId, issuedBy: UserId): Promise<void> {
  await trx('distributions').where({ id }).update({ status: 'issuing', issued_by: issuedBy })
}
