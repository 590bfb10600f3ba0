import { setWorkShares, updateWork, type WorkView } from '@fieldfare/contracts'
import { useQuery, useQueryClient } from '@tanstack/react-query'
import { Pencil } from 'lucide-react'
import { useState } from 'react'
import { useParams } from 'react-router'
import { Button } from '../../components/button.tsx'
import { DefinitionList } from '../../components/definition-list.tsx'
import { Code } from '../../components/figures.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { callApi } from '../../lib/api-client.ts'
import { showToast } from '../../lib/toasts.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { workQuery } from './catalogue-queries.ts'
import { SharesSection } from './shares-section.tsx'
import { WorkForm } from './work-form.tsx'

export function WorkPage() {
  const { workId = '' } = useParams()
  const work = useQuery(workQuery(workId))
  return (
    <QueryState query={work} loading="Fetching the work">
      {(data) => <WorkDetails key={data.id} work={data} />}
    </QueryState>
  )
}

function WorkDetails({ work }: { work: WorkView }) {
  const queryClient = useQueryClient()
  const takeOver = async (changed: WorkView) => {
    queryClient.setQueryData(workQuery(work.id).queryKey, changed)
    await refreshScopes(queryClient, 'works')
  }
  return (
    <>
      <PageHeader
        title={work.title}
        breadcrumbs={[{ label: 'Works', to: '/works' }]}
        lead={work.creators === '' ? 'No creators named.' : work.creators}
      />
      <WorkIdentity work={work} onChanged={takeOver} />
      <SharesSection
        right="works"
        shares={work.shares}
        canEdit={work.canEdit}
        onSave={async (body) => takeOver(await callApi(setWorkShares, { params: { workId: work.id }, body }))}
      />
      <Section title="Recordings of it">
        {work.recordings.length === 0 ? (
          <EmptyState title="No recording names this work">
            Money for works is earned through recordings: open a recording and choose this work there.
          </EmptyState>
        ) : (
          <WorkRecordings recordings={work.recordings} />
        )}
      </Section>
    </>
  )
}

function WorkRecordings({ recordings }: Pick<WorkView, 'recordings'>) {
  return (
    <ul className="divide-y divide-hairline border-b border-hairline">
      {recordings.map((recording) => (
        <li key={recording.id} className="flex flex-wrap items-baseline justify-between gap-x-6 py-2">
          <span>
            <TextLink to={`/recordings/${recording.id}`}>{recording.title}</TextLink>
            <span className="text-slate"> {recording.artist}</span>
          </span>
          <Code kind="isrc" value={recording.isrc} />
        </li>
      ))}
    </ul>
  )
}

type WorkIdentityProps = { work: WorkView; onChanged: (changed: WorkView) => Promise<void> }

function WorkIdentity({ work, onChanged }: WorkIdentityProps) {
  const [isEditing, setIsEditing] = useState(false)
  if (isEditing) {
    return (
      <Section title="Change the work">
        <WorkForm
          work={work}
          submitLabel="Save the work"
          onCancel={() => setIsEditing(false)}
          onSave={async (body) => {
            await onChanged(await callApi(updateWork, { params: { workId: work.id }, body }))
            setIsEditing(false)
            showToast('The work is saved.')
          }}
        />
      </Section>
    )
  }
  return (
    <Section
      title="Identity"
      actions={
        work.canEdit && (
          <Button icon={Pencil} onClick={() => setIsEditing(true)}>
            Change
          </Button>
        )
      }
    >
      <DefinitionList
        items={[
          { term: 'Title', value: work.title },
          { term: 'Creators', value: work.creators === '' ? 'Not named' : work.creators },
          {
            term: 'ISWC',
            value: work.iswc === null ? 'None yet' : <Code kind="iswc" value={work.iswc} />,
          },
        ]}
      />
    </Section>
  )
}
