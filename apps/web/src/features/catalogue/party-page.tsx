import { updateParty, type PartyView } from '@fieldfare/contracts'
import { useQuery, useQueryClient } from '@tanstack/react-query'
import { BookOpenText, Disc3, FileText, Pencil } from 'lucide-react'
import { useState } from 'react'
import { useParams } from 'react-router'
import { Button, LinkButton } from '../../components/button.tsx'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Count } from '../../components/figures.tsx'
import { Notice } from '../../components/notice.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { QueryState } from '../../components/states.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { partyQuery } from './catalogue-queries.ts'
import { IpiWithCheck } from './ipi-with-check.tsx'
import { PartyForm } from './party-form.tsx'

export function PartyPage() {
  const { partyId = '' } = useParams()
  const party = useQuery(partyQuery(partyId))
  return (
    <QueryState query={party} loading="Fetching the party">
      {(data) => <PartyDetails key={data.id} party={data} />}
    </QueryState>
  )
}

function PartyDetails({ party }: { party: PartyView }) {
  return (
    <>
      <PageHeader
        title={party.name}
        breadcrumbs={[{ label: 'Parties', to: '/parties' }]}
        actions={
          <LinkButton to={`/statements?partyId=${party.id}`} icon={FileText}>
            Statements
          </LinkButton>
        }
      />
      {party.ipiCheckOk === false && (
        <div className="mb-6">
          <Notice tone="warn" title="The check digits of this IPI do not fit">
            It is kept as it was given; some numbers in use fail the check. Compare it with the document it
            came from.
          </Notice>
        </div>
      )}
      <PartyIdentity party={party} />
      <Section title="Shares">
        <DefinitionList
          items={[
            { term: 'Works', value: <Count value={party.works} /> },
            { term: 'Recordings', value: <Count value={party.recordings} /> },
          ]}
        />
        <div className="mt-4 flex flex-wrap gap-2">
          <LinkButton to={`/works?partyId=${party.id}`} icon={BookOpenText}>
            Its works
          </LinkButton>
          <LinkButton to={`/recordings?partyId=${party.id}`} icon={Disc3}>
            Its recordings
          </LinkButton>
        </div>
      </Section>
    </>
  )
}

function PartyIdentity({ party }: { party: PartyView }) {
  const [isEditing, setIsEditing] = useState(false)
  const queryClient = useQueryClient()
  if (isEditing) {
    return (
      <Section title="Change the party">
        <PartyForm
          party={party}
          submitLabel="Save the party"
          onCancel={() => setIsEditing(false)}
          onSave={async (body) => {
            await callApi(updateParty, { params: { partyId: party.id }, body })
            await refreshScopes(queryClient, 'parties')
            setIsEditing(false)
            showToast('The party is saved.')
          }}
        />
      </Section>
    )
  }
  return (
    <Section
      title="Identity"
      actions={
        party.canEdit && (
          <Button icon={Pencil} onClick={() => setIsEditing(true)}>
            Change
          </Button>
        )
      }
    >
      <DefinitionList
        items={[
          { term: 'Name', value: party.name },
          { term: 'IPI', value: <IpiWithCheck party={party} /> },
        ]}
      />
    </Section>
  )
}
