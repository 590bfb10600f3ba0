import type { PartyView } from '@fieldfare/contracts'
import { Code } from '../../components/figures.tsx'
import { StatusTag } from '../../components/status-tag.tsx'

/** The IPI, with a word where its check digits do not fit. */
export function IpiWithCheck({ party }: { party: Pick<PartyView, 'ipi' | 'ipiCheckOk'> }) {
  if (party.ipi === null) return <span className="text-slate">None yet</span>
  return (
    <span className="flex flex-wrap gap-x-3">
      <Code kind="ipi" value={party.ipi} />
      {party.ipiCheckOk === false && <StatusTag tone="warn">Check digits do not fit</StatusTag>}
    </span>
  )
}
