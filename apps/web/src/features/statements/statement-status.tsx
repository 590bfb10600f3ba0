import type { StatementSummary } from '@fieldfare/contracts'
import { StatusTag } from '../../components/status-tag.tsx'

/** Whether a statement is final. */
export function StatementStatusTag({ status }: Pick<StatementSummary, 'status'>) {
  return status === 'issued' ? (
    <StatusTag tone="good">Issued</StatusTag>
  ) : (
    <StatusTag tone="waiting">Draft</StatusTag>
  )
}
