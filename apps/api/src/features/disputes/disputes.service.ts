import type { DisputeId, PlayId } from '@fieldfare/contracts'
import type { Actor, PageRequest } from '@fieldfare/database'
import { notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { readMonthStatus } from '../../records/month.repository.ts'
import { decideDispute, replyToDispute, type Decision } from './decide-dispute.service.ts'
import { presentDisputeView } from './dispute.presenter.ts'
import { disputeScopeOf } from './disputes.policy.ts'
import { findDispute, listDisputes, listMessages, type DisputeFilter } from './disputes.repository.ts'
import { openDispute } from './open-dispute.service.ts'

export function createDisputesService(dependencies: Dependencies) {
  const { database } = dependencies

  async function view(actor: Actor, id: DisputeId) {
    const dispute = await findDispute(database, disputeScopeOf(actor), id)
    if (dispute === null) throw notFound('This dispute')
    const messages = await listMessages(database, id)
    return presentDisputeView(dispute, messages, await readMonthStatus(database, dispute.month), actor)
  }

  return {
    list: (actor: Actor, filter: DisputeFilter & PageRequest) =>
      listDisputes(database, disputeScopeOf(actor), filter),
    view,
    async open(actor: Actor, request: { playId: PlayId; reason: string }) {
      return view(actor, await openDispute(dependencies, actor, request))
    },
    async reply(actor: Actor, id: DisputeId, text: string) {
      await replyToDispute(dependencies, actor, id, text)
      return view(actor, id)
    },
    async decide(actor: Actor, id: DisputeId, decision: Decision) {
      await decideDispute(dependencies, actor, id, decision)
      return view(actor, id)
    },
  }
}
