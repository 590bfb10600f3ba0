import { formatIsrc, setRecordingShares, updateRecording, type RecordingView } from '@fieldfare/contracts'
import { useQuery, useQueryClient } from '@tanstack/react-query'
import { ListMusic, Pencil } from 'lucide-react'
import { useState } from 'react'
import { useParams } from 'react-router'
import { Button, LinkButton } from '../../components/button.tsx'
import { DefinitionList, KeyFigures } from '../../components/definition-list.tsx'
import { Code, Count, Duration } from '../../components/figures.tsx'
import { Notice } from '../../components/notice.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { QueryState } from '../../components/states.tsx'
import { TextLink } from '../../components/text-link.tsx'
import { callApi } from '../../lib/api-client.ts'
import { formatHours } from '../../lib/format.ts'
import { showToast } from '../../lib/toasts.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { recordingQuery } from './catalogue-queries.ts'
import { LastPlayed } from './last-played.tsx'
import { RecordingForm } from './recording-form.tsx'
import { RecordingPlays } from './recording-plays.tsx'
import { RecordingReferenceAudio } from './recording-reference-audio.tsx'
import { ReferenceStatusTag } from './reference-status.tsx'
import { SharesSection } from './shares-section.tsx'

export function RecordingPage() {
  const { recordingId = '' } = useParams()
  const recording = useQuery(recordingQuery(recordingId))
  return (
    <QueryState query={recording} loading="Fetching the recording">
      {(data) => <RecordingDetails key={data.id} recording={data} />}
    </QueryState>
  )
}

function RecordingDetails({ recording }: { recording: RecordingView }) {
  const queryClient = useQueryClient()
  const takeOver = async (changed: RecordingView) => {
    queryClient.setQueryData(recordingQuery(recording.id).queryKey, changed)
    await refreshScopes(queryClient, 'recordings')
  }
  return (
    <>
      <PageHeader
        title={recording.title}
        breadcrumbs={[{ label: 'Recordings', to: '/recordings' }]}
        aside={<ReferenceStatusTag status={recording.referenceStatus} />}
        lead={recording.artist}
        actions={
          <LinkButton to={`/plays?recordingId=${recording.id}`} icon={ListMusic}>
            Its plays
          </LinkButton>
        }
      />
      {recording.isrcWarning !== null && (
        <div className="mb-6">
          <Notice tone="warn" title={`ISRC ${formatIsrc(recording.isrc)} may be mistyped`}>
            {recording.isrcWarning} Compare it with the document it came from.
          </Notice>
        </div>
      )}
      <KeyFigures
        items={[
          { label: 'Plays counted', value: <Count value={recording.plays} /> },
          { label: 'Airtime', value: formatHours(recording.playedSeconds) },
          { label: 'Last played', value: <LastPlayed instant={recording.lastPlayedAt} /> },
        ]}
      />
      <Identity recording={recording} onChanged={takeOver} />
      <SharesSection
        right="recordings"
        shares={recording.shares}
        canEdit={recording.canEdit}
        onSave={async (body) => {
          const params = { recordingId: recording.id }
          await takeOver(await callApi(setRecordingShares, { params, body }))
        }}
      />
      <RecordingReferenceAudio recording={recording} />
      <RecordingPlays recordingId={recording.id} />
    </>
  )
}

type IdentityProps = { recording: RecordingView; onChanged: (changed: RecordingView) => Promise<void> }

function Identity({ recording, onChanged }: IdentityProps) {
  const [isEditing, setIsEditing] = useState(false)
  if (isEditing) {
    return (
      <Section title="Change the recording">
        <RecordingForm
          recording={recording}
          submitLabel="Save the recording"
          onCancel={() => setIsEditing(false)}
          onSave={async (body) => {
            await onChanged(await callApi(updateRecording, { params: { recordingId: recording.id }, body }))
            setIsEditing(false)
            showToast('The recording is saved.')
          }}
        />
      </Section>
    )
  }
  return (
    <Section
      title="Identity"
      actions={
        recording.canEdit && (
          <Button icon={Pencil} onClick={() => setIsEditing(true)}>
            Change
          </Button>
        )
      }
    >
      <IdentityFacts recording={recording} />
    </Section>
  )
}

function IdentityFacts({ recording }: { recording: RecordingView }) {
  const { work } = recording
  return (
    <DefinitionList
      items={[
        { term: 'ISRC', value: <Code kind="isrc" value={recording.isrc} /> },
        { term: 'Title', value: recording.title },
        { term: 'Artist', value: recording.artist },
        {
          term: 'Length',
          value:
            recording.durationSeconds === null ? (
              'Not known yet'
            ) : (
              <Duration seconds={recording.durationSeconds} />
            ),
        },
        {
          term: 'Work',
          value:
            work === null ? (
              <span>No work named; money for works is held back.</span>
            ) : (
              <span className="flex flex-wrap gap-x-4">
                <TextLink to={`/works/${work.id}`}>{work.title}</TextLink>
                {work.iswc !== null && <Code kind="iswc" value={work.iswc} withLabel />}
              </span>
            ),
        },
      ]}
    />
  )
}
