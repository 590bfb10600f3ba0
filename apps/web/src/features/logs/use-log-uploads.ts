import { uploadLog, type StationView } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { useEffect, useReducer, useRef, useState } from 'react'
import { queryRoots } from '../../lib/query-roots.ts'
import { uploadFile } from '../../lib/upload-file.ts'
import {
  changeEntries,
  isUnsent,
  missingBeforeSending,
  refusalOf,
  type EntriesAction,
  type UploadEntry,
} from './upload-entries.ts'

export type LogUploads = {
  entries: readonly UploadEntry[]
  isSending: boolean
  dispatch: (action: EntriesAction) => void
  /** Sends what has not been sent, one file after the other: two at once would only share the line. */
  send: (station: StationView, chosen: readonly UploadEntry[]) => Promise<void>
}

function isAbort(error: unknown): boolean {
  return error instanceof DOMException && error.name === 'AbortError'
}

export function useLogUploads(): LogUploads {
  const [entries, dispatch] = useReducer(changeEntries, [])
  const [isSending, setIsSending] = useState(false)
  const queryClient = useQueryClient()
  const abort = useRef<AbortController | null>(null)
  useEffect(() => () => abort.current?.abort(), [])

  const sendOne = async (station: StationView, entry: UploadEntry, signal: AbortSignal) => {
    const { key, file, startedAtLocal, occurrence } = entry
    const change = (state: UploadEntry['state'], more: Partial<UploadEntry> = {}) =>
      dispatch({ kind: 'change', key, change: { ...more, state } })
    change({ kind: 'sending', progress: null })
    try {
      const log = await uploadFile(uploadLog, {
        params: { stationId: station.id },
        fields: { startedAtLocal, timeZone: station.timeZone, occurrence },
        file,
        signal,
        onProgress: (progress) => change({ kind: 'sending', progress }),
      })
      change({ kind: 'sent', log }, { isSuggested: false })
      void queryClient.invalidateQueries({ queryKey: queryRoots.logs })
    } catch (error) {
      if (isAbort(error)) return
      const refusal = refusalOf(error)
      change(
        { kind: 'refused', refusal },
        { asksOccurrence: entry.asksOccurrence || refusal.occurrence !== undefined },
      )
    }
  }

  const send = async (station: StationView, chosen: readonly UploadEntry[]) => {
    const complete: UploadEntry[] = []
    for (const entry of chosen.filter(isUnsent)) {
      const missing = missingBeforeSending(entry)
      if (missing === null) complete.push(entry)
      else
        dispatch({ kind: 'change', key: entry.key, change: { state: { kind: 'refused', refusal: missing } } })
    }
    const controller = new AbortController()
    abort.current = controller
    setIsSending(true)
    for (const entry of complete) {
      if (controller.signal.aborted) break
      await sendOne(station, entry, controller.signal)
    }
    setIsSending(false)
  }

  return { entries, isSending, dispatch, send }
}
