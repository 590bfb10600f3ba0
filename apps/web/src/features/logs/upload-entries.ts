import { localDateTimeSchema, type StationLogView } from '@fieldfare/contracts'
import { describeFailure, isApiProblem } from '../../lib/api-problem.ts'
import type { UploadProgress } from '../../lib/upload-file.ts'
import { localTimeInFileName } from './time-in-file-name.ts'

export type Occurrence = '' | 'earlier' | 'later'

export type UploadRefusal = {
  startedAtLocal?: string
  occurrence?: string
  /** What concerns the file as a whole. */
  file?: { title: string; detail: string }
}

export type UploadState =
  | { kind: 'ready' }
  | { kind: 'sending'; progress: UploadProgress | null }
  | { kind: 'sent'; log: StationLogView }
  | { kind: 'refused'; refusal: UploadRefusal }

export type UploadEntry = {
  key: string
  file: File
  startedAtLocal: string
  /** The start was read from the file's name and nobody has checked it yet. */
  isSuggested: boolean
  /** The server has asked which of two equal local times is meant. */
  asksOccurrence: boolean
  occurrence: Occurrence
  state: UploadState
}

export type EntryChange = Partial<Omit<UploadEntry, 'key' | 'file'>>

export type EntriesAction =
  | { kind: 'add'; files: readonly File[] }
  | { kind: 'remove'; key: string }
  | { kind: 'change'; key: string; change: EntryChange }
  /** Another station has another clock: what was asked about the old one no longer holds. */
  | { kind: 'station-changed' }

function keyOf(file: File): string {
  return `${file.name} ${file.size} ${file.lastModified}`
}

function entryOf(file: File): UploadEntry {
  const suggestion = localTimeInFileName(file.name)
  return {
    key: keyOf(file),
    file,
    startedAtLocal: suggestion ?? '',
    isSuggested: suggestion !== null,
    asksOccurrence: false,
    occurrence: '',
    state: { kind: 'ready' },
  }
}

/** The files to send; one chosen twice is listed once. */
export function changeEntries(entries: readonly UploadEntry[], action: EntriesAction): UploadEntry[] {
  switch (action.kind) {
    case 'add': {
      const known = new Set(entries.map((entry) => entry.key))
      const added = action.files.filter((file) => !known.has(keyOf(file))).map(entryOf)
      return [...entries, ...added]
    }
    case 'remove':
      return entries.filter((entry) => entry.key !== action.key)
    case 'change':
      return entries.map((entry) => (entry.key === action.key ? { ...entry, ...action.change } : entry))
    case 'station-changed':
      return entries.map((entry) =>
        entry.state.kind === 'sent'
          ? entry
          : { ...entry, asksOccurrence: false, occurrence: '', state: { kind: 'ready' } },
      )
  }
}

export function isUnsent(entry: UploadEntry): boolean {
  return entry.state.kind === 'ready' || entry.state.kind === 'refused'
}

/** What is missing before an entry can be sent, or null. */
export function missingBeforeSending(entry: UploadEntry): UploadRefusal | null {
  const start = localDateTimeSchema.safeParse(entry.startedAtLocal)
  if (!start.success) return { startedAtLocal: 'Enter the date and time at which this recording begins.' }
  if (entry.asksOccurrence && entry.occurrence === '') {
    return { occurrence: 'Say which of the two it was.' }
  }
  return null
}

/** Sorts the server's complaints to the fields of an entry; whatever has no field concerns the file. */
export function refusalOf(error: unknown): UploadRefusal {
  const refusal: UploadRefusal = {}
  const { title, detail } = describeFailure(error)
  for (const { path, message } of isApiProblem(error) ? error.fieldErrors : []) {
    const name = path.replace(/^body\./, '')
    if (name === 'startedAtLocal' || name === 'occurrence') refusal[name] = message
    else refusal.file = { title, detail: message }
  }
  if (Object.keys(refusal).length === 0) refusal.file = { title, detail }
  return refusal
}
