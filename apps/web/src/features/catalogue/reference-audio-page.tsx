import { useQuery } from '@tanstack/react-query'
import { FilterBar, SelectFilter } from '../../components/filters.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { Pagination } from '../../components/pagination.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { useListSearch } from '../../lib/list-search.ts'
import { useRole } from '../../lib/session.ts'
import { referenceAudioQuery } from './catalogue-queries.ts'
import { ManyReferenceAudio } from './many-reference-audio.tsx'
import { ReferenceAudioList } from './reference-audio-list.tsx'
import { referenceStatusChoices } from './reference-status.tsx'
import { useReferenceProgress } from './use-reference-progress.ts'

const stateChoices = referenceStatusChoices.filter(({ value }) => value !== 'none')

export function ReferenceAudioPage() {
  const isClerk = useRole() === 'clerk'
  return (
    <>
      <PageHeader
        title="Reference audio"
        breadcrumbs={[{ label: 'Recordings', to: '/recordings' }]}
        lead="The sound by which recordings are found in station logs."
      />
      {isClerk && (
        <Section
          title="Send many files"
          lead="Each file goes to the recording whose ISRC stands in its name, for example “AA-6Q7-20-00047 First light.flac”."
        >
          <ManyReferenceAudio />
        </Section>
      )}
      <Section title="What was sent" lead="Newest first. States change here by themselves.">
        <SentAudio canRetry={isClerk} />
      </Section>
    </>
  )
}

function SentAudio({ canRetry }: { canRetry: boolean }) {
  const fractions = useReferenceProgress()
  const search = useListSearch({ filters: ['status'], pageSize: 25 })
  const audio = useQuery(referenceAudioQuery(search.query))
  return (
    <>
      <FilterBar search={search}>
        <SelectFilter
          label="State"
          allLabel="Any state"
          choices={stateChoices}
          value={search.filters.status}
          onChange={(value) => search.setFilter('status', value)}
        />
      </FilterBar>
      <QueryState query={audio} loading="Fetching the reference audio">
        {({ items, total }) =>
          items.length === 0 ? (
            <EmptyState title={search.hasFilters ? 'None in this state' : 'No reference audio yet'}>
              {search.hasFilters
                ? 'Choose another state or clear the filter.'
                : 'Send the first files above; their fingerprints are made at once.'}
            </EmptyState>
          ) : (
            <div className="grid gap-3">
              <ReferenceAudioList items={items} fractions={fractions} withRecording canRetry={canRetry} />
              <Pagination
                page={search.page}
                pageSize={search.pageSize}
                total={total}
                noun="files"
                onPageChange={search.setPage}
                onPageSizeChange={search.setPageSize}
              />
            </div>
          )
        }
      </QueryState>
    </>
  )
}
