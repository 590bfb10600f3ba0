import {
  getParty,
  getRecording,
  getRecordingPlays,
  getWork,
  listParties,
  listRecordings,
  listReferenceAudio,
  listWorks,
} from '@fieldfare/contracts'
import { keepPreviousData, queryOptions } from '@tanstack/react-query'
import { callApi } from '../../lib/api-client.ts'
import type { ListSearch } from '../../lib/list-search.ts'

export function recordingsQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['recordings', 'list', query],
    queryFn: ({ signal }) => callApi(listRecordings, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function recordingQuery(recordingId: string) {
  return queryOptions({
    queryKey: ['recordings', 'one', recordingId],
    queryFn: ({ signal }) => callApi(getRecording, { params: { recordingId }, signal }),
    staleTime: 10_000,
  })
}

export function recordingPlaysQuery(recordingId: string) {
  return queryOptions({
    queryKey: ['recordings', 'play-counts', recordingId],
    queryFn: ({ signal }) => callApi(getRecordingPlays, { params: { recordingId }, signal }),
    staleTime: 60_000,
  })
}

/** Fingerprints are followed live; asking again every few seconds covers a lost event stream while any is in work. */
export function referenceAudioQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['reference-audio', query],
    queryFn: ({ signal }) => callApi(listReferenceAudio, { query, signal }),
    staleTime: 5_000,
    placeholderData: keepPreviousData,
    refetchInterval: ({ state }) =>
      state.data?.items.some(({ status }) => status === 'waiting' || status === 'fingerprinting') === true
        ? 10_000
        : false,
  })
}

export function worksQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['works', 'list', query],
    queryFn: ({ signal }) => callApi(listWorks, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function workQuery(workId: string) {
  return queryOptions({
    queryKey: ['works', 'one', workId],
    queryFn: ({ signal }) => callApi(getWork, { params: { workId }, signal }),
    staleTime: 10_000,
  })
}

export function partiesQuery(query: ListSearch['query']) {
  return queryOptions({
    queryKey: ['parties', 'list', query],
    queryFn: ({ signal }) => callApi(listParties, { query, signal }),
    staleTime: 10_000,
    placeholderData: keepPreviousData,
  })
}

export function partyQuery(partyId: string) {
  return queryOptions({
    queryKey: ['parties', 'one', partyId],
    queryFn: ({ signal }) => callApi(getParty, { params: { partyId }, signal }),
    staleTime: 10_000,
  })
}
