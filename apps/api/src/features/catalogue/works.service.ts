import { formatIswc, type WorkId } from '@fieldfare/contracts'
import {
  inTransaction,
  recordAudit,
  violates,
  type Actor,
  type Database,
  type Scope,
} from '@fieldfare/database'
import { notFound } from '../../http/app-error.ts'
import { describeChanges } from './field-changes.ts'
import { setShares, type SharesInput } from './set-shares.ts'
import { takenCode } from './taken-code.ts'
import {
  findWork,
  findWorkByIswc,
  insertWork,
  listWorksInScope,
  lockWork,
  updateWorkDetails,
  type WorkDetails,
  type WorkFilter,
  type WorkRecord,
} from './works.repository.ts'

export function createWorksService({ database }: { database: Database }) {
  async function demand(scope: Scope, id: WorkId): Promise<WorkRecord> {
    const work = await findWork(database, scope, id)
    if (work === null) throw notFound('This work')
    return work
  }

  async function refuseTakenIswc(error: unknown, iswc: string | null): Promise<never> {
    if (iswc === null || !violates(error, 'works_iswc_key')) throw error
    const holder = await findWorkByIswc(database, iswc)
    throw takenCode('iswc', formatIswc(iswc), holder === null ? null : `“${holder.title}”`)
  }

  async function create(actor: Actor, details: WorkDetails): Promise<WorkRecord> {
    const id = await inTransaction(database, async (trx) => {
      const workId = await insertWork(trx, details)
      await recordAudit(trx, {
        actor,
        action: 'create-work',
        subjectKind: 'work',
        subjectId: workId,
        summary: `Added the work “${details.title}”, ${details.iswc ?? 'no ISWC'}.`,
      })
      return workId
    }).catch((error: unknown) => refuseTakenIswc(error, details.iswc))
    return demand({ kind: 'all' }, id)
  }

  async function update(actor: Actor, id: WorkId, details: WorkDetails): Promise<WorkRecord> {
    await inTransaction(database, async (trx) => {
      const before = await lockWork(trx, id)
      if (before === null) throw notFound('This work')
      const changes = describeChanges([
        { label: 'title', before: before.title, after: details.title },
        { label: 'creators', before: before.creators, after: details.creators },
        { label: 'ISWC', before: before.iswc, after: details.iswc },
      ])
      if (changes === '') return
      await updateWorkDetails(trx, id, details)
      await recordAudit(trx, {
        actor,
        action: 'update-work',
        subjectKind: 'work',
        subjectId: id,
        summary: `Changed the work “${before.title}”: ${changes}.`,
      })
    }).catch((error: unknown) => refuseTakenIswc(error, details.iswc))
    return demand({ kind: 'all' }, id)
  }

  async function replaceShares(actor: Actor, id: WorkId, input: SharesInput): Promise<WorkRecord> {
    await setShares(database, actor, { kind: 'work', id }, input, async (trx) => {
      const work = await lockWork(trx, id)
      if (work === null) throw notFound('This work')
      return `the work “${work.title}”`
    })
    return demand({ kind: 'all' }, id)
  }

  return {
    list: (scope: Scope, filter: WorkFilter) => listWorksInScope(database, scope, filter),
    get: demand,
    create,
    update,
    replaceShares,
  }
}
