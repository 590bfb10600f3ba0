import type { SharePeriodTotal } from '@fieldfare/contracts'
import { Percent } from '../../components/figures.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { periodInWords, verdictOn } from './shares-form.ts'

/** What is claimed in every stretch of days, while it is typed. */
export function ShareTotals({ totals }: { totals: readonly SharePeriodTotal[] }) {
  return (
    <div aria-live="polite">
      <h3 className="border-b border-ink pb-1">Claimed by period</h3>
      {totals.length === 0 ? (
        <p className="py-2 text-slate">Nothing is claimed: everything will be held back.</p>
      ) : (
        <ul className="divide-y divide-hairline border-b border-hairline">
          {totals.map((total) => {
            const { tone, words } = verdictOn(total.totalPpm)
            return (
              <li
                key={total.from}
                className="grid gap-x-4 py-1.5 sm:grid-cols-[minmax(0,1fr)_8rem_minmax(0,14rem)]"
              >
                <span>{periodInWords(total)}</span>
                <span className="sm:text-right">
                  <Percent ppm={total.totalPpm} decimals={4} />
                </span>
                <StatusTag tone={tone}>{words}</StatusTag>
              </li>
            )
          })}
        </ul>
      )}
    </div>
  )
}
