import { useQuery } from '@tanstack/react-query'
import { useLocation } from 'react-router'
import { detectionsQuery } from './detections-queries.ts'
import { useDetectionListSearch } from './use-detection-list.ts'

export type Neighbours = {
  /** Back to the list this detection was opened from. */
  list: string
  previous: string | null
  next: string | null
  /** "3 of 50 on this page of the list"; null when opened from elsewhere. */
  place: string | null
}

/** The detections before and after this one in the list it was opened from. */
export function useNeighbours(detectionId: string): Neighbours {
  const { search } = useLocation()
  const isFromList = search !== ''
  const criteria = useDetectionListSearch()
  const list = useQuery({ ...detectionsQuery(criteria.query), enabled: isFromList })
  const ids = isFromList ? (list.data?.items ?? []).map(({ id }): string => id) : []
  const index = ids.indexOf(detectionId)
  const addressOf = (id: string | undefined) => (id === undefined ? null : `/detections/${id}${search}`)
  if (index < 0) return { list: `/detections${search}`, previous: null, next: null, place: null }
  return {
    list: `/detections${search}`,
    previous: index === 0 ? null : addressOf(ids[index - 1]),
    next: addressOf(ids[index + 1]),
    place: `${index + 1} of ${ids.length} on this page of the list`,
  }
}
