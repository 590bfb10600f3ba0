import type { ReferenceStatus } from '@fieldfare/contracts'
import { StatusTag, type StatusTone } from '../../components/status-tag.tsx'

const looks = {
  none: { tone: 'warn', word: 'No reference audio' },
  waiting: { tone: 'waiting', word: 'Waiting' },
  fingerprinting: { tone: 'calm', word: 'Being fingerprinted' },
  ready: { tone: 'good', word: 'Fingerprinted' },
  failed: { tone: 'bad', word: 'Failed' },
} as const satisfies Record<ReferenceStatus, { tone: StatusTone; word: string }>

/** How far the reference audio of a recording is. */
export function ReferenceStatusTag({ status }: { status: ReferenceStatus }) {
  const { tone, word } = looks[status]
  return <StatusTag tone={tone}>{word}</StatusTag>
}

export const referenceStatusChoices = [
  { value: 'none', label: looks.none.word },
  { value: 'waiting', label: looks.waiting.word },
  { value: 'fingerprinting', label: looks.fingerprinting.word },
  { value: 'ready', label: looks.ready.word },
  { value: 'failed', label: looks.failed.word },
] as const
