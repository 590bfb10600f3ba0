import type { DetectionId } from '@fieldfare/contracts'
import { scopeOf, type Actor, type PageRequest, type Scope } from '@fieldfare/database'
import { notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { monthOfDay, readMonthStatus } from '../../records/month.repository.ts'
import { provideClip, type ClipRequest } from './clips.service.ts'
import { readDetectionHistory } from './detection-history.repository.ts'
import { reviewDetection, type Review } from './detection-review.service.ts'
import { presentDetectionDetail } from './detection.presenter.ts'
import {
  findDetection,
  listDetections,
  streamDetections,
  type DetectionFilter,
} from './detections.repository.ts'

export function createDetectionsService(dependencies: Dependencies) {
  const { database } = dependencies

  async function detail(actor: Actor, id: DetectionId) {
    const detection = await findDetection(database, scopeOf(actor), id)
    if (detection === null) throw notFound('This detection')
    const history = await readDetectionHistory(database, id)
    const monthStatus = await readMonthStatus(database, monthOfDay(detection.localDay))
    return presentDetectionDetail(detection, history, monthStatus, actor)
  }

  return {
    list: (scope: Scope, filter: DetectionFilter & PageRequest) => listDetections(database, scope, filter),
    stream: (scope: Scope, filter: DetectionFilter) => streamDetections(database, scope, filter),
    detail,
    async review(actor: Actor, id: DetectionId, review: Review) {
      await reviewDetection(database, actor, id, review)
      return detail(actor, id)
    },
    clip: (scope: Scope, clip: ClipRequest, signal: AbortSignal) =>
      provideClip(dependencies, scope, clip, signal),
  }
}
