import {
  roleLabels,
  roles,
  stationIdSchema,
  type PartyId,
  type Role,
  type StationId,
} from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { X } from 'lucide-react'
import { useState } from 'react'
import { IconButton } from '../../components/button.tsx'
import { CheckboxField, ChoiceGroup, RadioField } from '../../components/choice-field.tsx'
import { PartySelect, type ChosenParty } from '../../components/party-select.tsx'
import { QueryState } from '../../components/states.tsx'
import { stationsQuery } from '../../lib/reference-queries.ts'

const duties = {
  uploader: 'delivers the logs of the stations chosen below',
  clerk: 'keeps the catalogue, reviews airtime, closes months, answers disputes',
  publisher: 'sees works, plays and statements of the parties chosen below',
  auditor: 'reads everything, disputes plays, reads the audit trail',
  admin: 'manages users, stations and licences; approves no money',
} as const satisfies Record<Role, string>

type RoleFieldProps = { value: string; onChange: (role: Role) => void }

/** What a person is to do here. */
export function RoleField({ value, onChange }: RoleFieldProps) {
  return (
    <ChoiceGroup legend="Role" name="role">
      {roles.map((role) => (
        <RadioField
          key={role}
          name="role"
          value={role}
          checked={value === role}
          onChange={() => onChange(role)}
          label={
            <>
              {roleLabels[role]}: <span className="text-slate">{duties[role]}</span>
            </>
          }
        />
      ))}
    </ChoiceGroup>
  )
}

type StationsFieldProps = { value: readonly string[]; onChange: (stationIds: StationId[]) => void }

/** The stations a log uploader works for. */
export function StationsField({ value, onChange }: StationsFieldProps) {
  const stations = useQuery(stationsQuery())
  const toggle = (id: StationId, isOn: boolean) => {
    const others = value.filter((other) => other !== id).map((other) => stationIdSchema.parse(other))
    onChange(isOn ? [...others, id] : others)
  }
  return (
    <ChoiceGroup legend="Stations" name="stationIds" hint="They see and deliver logs of these only.">
      <QueryState query={stations} loading="Fetching the stations">
        {({ items }) =>
          items.length === 0 ? (
            <p className="text-slate">There is no station yet. Add one under Stations first.</p>
          ) : (
            items.map((station) => (
              <CheckboxField
                key={station.id}
                label={`${station.name} (${station.callName})`}
                checked={value.includes(station.id)}
                onChange={(event) => toggle(station.id, event.currentTarget.checked)}
              />
            ))
          )
        }
      </QueryState>
    </ChoiceGroup>
  )
}

type PartiesFieldProps = {
  present: readonly ChosenParty[]
  onChange: (partyIds: PartyId[]) => void
}

/** The parties a publisher sees and is paid for. */
export function PartiesField({ present, onChange }: PartiesFieldProps) {
  const [chosen, setChosen] = useState<readonly ChosenParty[]>(present)
  const change = (parties: readonly ChosenParty[]) => {
    setChosen(parties)
    onChange(parties.map(({ id }) => id))
  }
  return (
    <ChoiceGroup
      legend="Parties"
      name="partyIds"
      hint="They see works, plays and statements of these parties only."
    >
      {chosen.length > 0 && (
        <ul className="divide-y divide-hairline border-y border-hairline">
          {chosen.map((party) => (
            <li key={party.id} className="flex items-center justify-between gap-2">
              {party.name}
              <IconButton
                icon={X}
                label={`Take out ${party.name}`}
                onClick={() => change(chosen.filter(({ id }) => id !== party.id))}
              />
            </li>
          ))}
        </ul>
      )}
      <PartySelect
        label="Add a party"
        selected={null}
        onSelect={(party) => {
          if (party !== null && !chosen.some(({ id }) => id === party.id)) change([...chosen, party])
        }}
      />
    </ChoiceGroup>
  )
}
