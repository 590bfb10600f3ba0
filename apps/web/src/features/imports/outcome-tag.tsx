import type { EndpointOutput, listCatalogueImportRows } from '@fieldfare/contracts'
import { StatusTag, type StatusTone } from '../../components/status-tag.tsx'

type Outcome = EndpointOutput<typeof listCatalogueImportRows>['items'][number]['outcome']

const looks = {
  created: { tone: 'good', word: 'Created' },
  updated: { tone: 'calm', word: 'Updated' },
  unchanged: { tone: 'waiting', word: 'Unchanged' },
  refused: { tone: 'bad', word: 'Refused' },
} as const satisfies Record<Outcome, { tone: StatusTone; word: string }>

/** What became of a row. */
export function OutcomeTag({ outcome }: { outcome: Outcome }) {
  return <StatusTag tone={looks[outcome].tone}>{looks[outcome].word}</StatusTag>
}

export const outcomeChoices = [
  { value: 'refused', label: looks.refused.word },
  { value: 'created', label: looks.created.word },
  { value: 'updated', label: looks.updated.word },
  { value: 'unchanged', label: looks.unchanged.word },
] as const
