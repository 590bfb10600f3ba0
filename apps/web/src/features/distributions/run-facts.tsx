import type { DistributionView } from '@fieldfare/contracts'
import { DefinitionList } from '../../components/definition-list.tsx'

const SHOWN_DIGITS = 16

/** By what rules the result came about, and how to tell it is the same one again. */
export function RunFacts({ view }: { view: DistributionView }) {
  return (
    <DefinitionList
      items={[
        view.run === null ? null : { term: 'Run', value: <span className="figures">{view.run}</span> },
        view.ruleVersion === null ? null : { term: 'Rule version', value: view.ruleVersion },
        view.digest === null
          ? null
          : {
              term: 'Digest of the result',
              value: (
                <>
                  <code className="figures" title={view.digest}>
                    {shortDigest(view.digest)}
                  </code>
                  <span className="block text-sm text-slate">
                    The first {SHOWN_DIGITS} of its 64 figures (SHA-256). Calculating again from the same
                    facts gives the same digest; a single unit of difference gives another. What is approved
                    is the result with this digest.
                  </span>
                </>
              ),
            },
      ]}
    />
  )
}

export function shortDigest(digest: string): string {
  return digest.slice(0, SHOWN_DIGITS).replace(/(.{4})(?=.)/g, '$1 ')
}
