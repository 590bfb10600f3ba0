import { Section } from '../../components/page-header.tsx'
import { useSession } from '../../lib/session.ts'

/** How and until when a statement can be questioned, and what it is not. */
export function HowToQuestion() {
  const { society, user } = useSession()
  return (
    <Section title="How to question this statement">
      <div className="grid max-w-[72ch] gap-3">
        {user.role === 'clerk' ? (
          <p>
            A publisher opens the line that looks wrong and disputes the play in question, or writes to{' '}
            {society.name} with the statement number. You answer under Disputes.
          </p>
        ) : (
          <p>
            Open the line that looks wrong and dispute the play in question: say what you heard, and{' '}
            {society.name} answers under Disputes. For anything else, write to the society with the statement
            number.
          </p>
        )}
        <p>
          A play of an open month is taken out when a dispute is upheld. A month that is issued does not
          change; the society’s distribution rules say until when it is corrected in a later one.
        </p>
        <p className="text-sm text-slate">
          Statements are computed from evidence and the society’s own rules; they are not legal or tax advice.
          Contracts, local law and the society’s distribution rules prevail.
        </p>
      </div>
    </Section>
  )
}
