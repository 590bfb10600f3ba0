import { createLicence, updateLicence, type LicenceView, type StationView } from '@fieldfare/contracts'
import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useMemo } from 'react'
import { useNavigate, useParams } from 'react-router'
import { Button, LinkButton } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { EmptyState, QueryState } from '../../components/states.tsx'
import { DateTimeField, TextField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { queryRoots } from '../../lib/query-roots.ts'
import { useSession } from '../../lib/session.ts'
import { showToast } from '../../lib/toasts.ts'
import { licenceFields, licenceFormSchema } from './licence-form.ts'
import { stationQuery } from './stations-queries.ts'

export function NewLicencePage() {
  const { stationId = '' } = useParams()
  const station = useQuery(stationQuery(stationId))
  return (
    <QueryState query={station} loading="Fetching the station">
      {(data) => <LicenceEditor title="Add a licence" station={data} licence={null} />}
    </QueryState>
  )
}

export function EditLicencePage() {
  const { stationId = '', licenceId = '' } = useParams()
  const station = useQuery(stationQuery(stationId))
  return (
    <QueryState query={station} loading="Fetching the licence">
      {(data) => {
        const licence = data.licences.find(({ id }) => id === licenceId)
        return licence === undefined ? (
          <EmptyState
            title="This station has no such licence"
            action={<LinkButton to={`/stations/${data.id}`}>{`Go to ${data.name}`}</LinkButton>}
          />
        ) : (
          <LicenceEditor title="Edit the licence" station={data} licence={licence} />
        )
      }}
    </QueryState>
  )
}

type LicenceEditorProps = { title: string; station: StationView; licence: LicenceView | null }

function LicenceEditor({ title, station, licence }: LicenceEditorProps) {
  const { society } = useSession()
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  const schema = useMemo(() => licenceFormSchema(society.currencyDigits), [society.currencyDigits])
  const form = useContractForm(schema, { defaultValues: licenceFields(licence, society.currencyDigits) })
  return (
    <>
      <PageHeader
        title={title}
        breadcrumbs={[
          { label: 'Stations', to: '/stations' },
          { label: station.name, to: `/stations/${station.id}` },
        ]}
      />
      <Form
        form={form}
        onSubmit={async (body) => {
          const saved =
            licence === null
              ? await callApi(createLicence, { params: { stationId: station.id }, body })
              : await callApi(updateLicence, { params: { licenceId: licence.id }, body })
          queryClient.setQueryData(stationQuery(saved.id).queryKey, saved)
          void queryClient.invalidateQueries({ queryKey: queryRoots.stations })
          showToast('The licence is saved.')
          await navigate(`/stations/${station.id}`)
        }}
        actions={
          <>
            <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
              Save the licence
            </Button>
            <LinkButton to={`/stations/${station.id}`}>Cancel</LinkButton>
          </>
        }
      >
        <DateTimeField {...form.register('validFrom')} kind="date" label="First day" />
        <DateTimeField
          {...form.register('validTo')}
          kind="date"
          label="Last day"
          hint="Left empty, it runs until another is agreed. Licences of one station never overlap."
          optional
        />
        <TextField
          {...form.register('monthlyFeeMinor')}
          label={`Fee a month in ${society.currency}`}
          inputMode="decimal"
          code
        />
        <TextField
          {...form.register('worksPartPpm')}
          label="Part that goes to works, in %"
          hint="Of the fee after deductions. The rest goes to recordings."
          inputMode="decimal"
          code
        />
      </Form>
    </>
  )
}
