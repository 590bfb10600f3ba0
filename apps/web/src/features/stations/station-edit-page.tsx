import { createStation, stationInputSchema, updateStation, type StationView } from '@fieldfare/contracts'
import { useQuery, useQueryClient } from '@tanstack/react-query'
import { useNavigate, useParams } from 'react-router'
import { Button, LinkButton } from '../../components/button.tsx'
import { SelectField } from '../../components/choice-field.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { PageHeader } from '../../components/page-header.tsx'
import { QueryState } from '../../components/states.tsx'
import { TextField } from '../../components/text-field.tsx'
import { callApi } from '../../lib/api-client.ts'
import { queryRoots } from '../../lib/query-roots.ts'
import { useSession } from '../../lib/session.ts'
import { showToast } from '../../lib/toasts.ts'
import { stationQuery } from './stations-queries.ts'

export function NewStationPage() {
  return (
    <>
      <PageHeader
        title="Add a station"
        lead="Its licence comes next, on its own page."
        breadcrumbs={[{ label: 'Stations', to: '/stations' }]}
      />
      <StationForm station={null} />
    </>
  )
}

export function EditStationPage() {
  const { stationId = '' } = useParams()
  const station = useQuery(stationQuery(stationId))
  return (
    <QueryState query={station} loading="Fetching the station">
      {(data) => (
        <>
          <PageHeader
            title={`Edit ${data.name}`}
            breadcrumbs={[
              { label: 'Stations', to: '/stations' },
              { label: data.name, to: `/stations/${data.id}` },
            ]}
          />
          <StationForm station={data} />
        </>
      )}
    </QueryState>
  )
}

const zoneChoices = Intl.supportedValuesOf('timeZone').map((zone) => ({
  value: zone,
  label: zone.replaceAll('_', ' '),
}))

/** A zone this browser does not list stays choosable. */
function choicesWith(zone: string) {
  return zoneChoices.some(({ value }) => value === zone)
    ? zoneChoices
    : [{ value: zone, label: zone }, ...zoneChoices]
}

function StationForm({ station }: { station: StationView | null }) {
  const { society } = useSession()
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  const form = useContractForm(stationInputSchema, {
    defaultValues: {
      callName: station?.callName ?? '',
      name: station?.name ?? '',
      timeZone: station?.timeZone ?? society.timeZone,
      contactEmail: station?.contactEmail ?? '',
    },
  })
  return (
    <Form
      form={form}
      onSubmit={async (values) => {
        const body = { ...values, contactEmail: values.contactEmail ?? '' }
        const saved =
          station === null
            ? await callApi(createStation, { body })
            : await callApi(updateStation, { params: { stationId: station.id }, body })
        queryClient.setQueryData(stationQuery(saved.id).queryKey, saved)
        void queryClient.invalidateQueries({ queryKey: queryRoots.stations })
        showToast(station === null ? `${saved.name} is added.` : `${saved.name} is saved.`)
        await navigate(`/stations/${saved.id}`)
      }}
      actions={
        <>
          <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
            {station === null ? 'Add the station' : 'Save'}
          </Button>
          <LinkButton to={station === null ? '/stations' : `/stations/${station.id}`}>Cancel</LinkButton>
        </>
      }
    >
      <TextField {...form.register('name')} label="Name" />
      <TextField
        {...form.register('callName')}
        label="Call name"
        hint="2 to 12 letters, figures or hyphens; shown where room is short."
        code
      />
      <SelectField
        {...form.register('timeZone')}
        label="Time zone"
        hint="Decides to which day and month a play belongs. It is fixed once logs are held."
        choices={choicesWith(station?.timeZone ?? society.timeZone)}
      />
      <TextField
        {...form.register('contactEmail')}
        type="email"
        label="Contact e-mail"
        hint="Whom to ask about missing logs."
        optional
      />
    </Form>
  )
}
