import type { Role } from '@fieldfare/contracts'

/** Kinds of things the audit trail speaks of, as people call them, with the page of each where there is one. */
const subjects: Readonly<Record<string, { label: string; path?: string }>> = {
  recording: { label: 'Recording', path: '/recordings' },
  work: { label: 'Work', path: '/works' },
  party: { label: 'Party', path: '/parties' },
  'catalogue-import': { label: 'Import', path: '/imports' },
  'reference-audio': { label: 'Reference audio' },
  station: { label: 'Station', path: '/stations' },
  'station-log': { label: 'Station log', path: '/logs' },
  detection: { label: 'Detection', path: '/detections' },
  distribution: { label: 'Distribution' },
  dispute: { label: 'Dispute', path: '/disputes' },
  user: { label: 'User', path: '/users' },
  session: { label: 'Session' },
}

export const subjectChoices = Object.entries(subjects).map(([value, { label }]) => ({ value, label }))

export function subjectLabel(kind: string): string {
  return subjects[kind]?.label ?? kind
}

const adminPages: readonly string[] = ['user', 'station']

/** The page of a subject that is open to somebody; administrators see users and stations, auditors all but users. */
export function subjectPath({ kind, id }: { kind: string; id: string }, role: Role): string | null {
  const path = subjects[kind]?.path
  const isOpen = role === 'admin' ? adminPages.includes(kind) : kind !== 'user'
  return path === undefined || !isOpen ? null : `${path}/${id}`
}
