import { Trash2 } from 'lucide-react'
import { useController } from 'react-hook-form'
import { IconButton } from '../../components/button.tsx'
import type { ContractForm } from '../../components/form.tsx'
import { PartySelect } from '../../components/party-select.tsx'
import { DateTimeField, TextField } from '../../components/text-field.tsx'
import type { SharesFormInput, SharesFormOutput } from './shares-form.ts'

type ShareRowProps = {
  form: ContractForm<SharesFormInput, SharesFormOutput>
  index: number
  onRemove: () => void
}

/** One party's share with the days it is valid on. */
export function ShareRow({ form, index, onRemove }: ShareRowProps) {
  const { field } = useController({ control: form.control, name: `shares.${index}.partyId` })
  const name = form.getValues(`shares.${index}.partyName`)
  return (
    <div
      role="group"
      aria-label={`Share ${index + 1}`}
      className="grid items-start gap-3 border-b border-hairline pb-4 sm:grid-cols-[minmax(0,1fr)_minmax(0,1fr)_auto]"
    >
      <PartySelect
        label="Party"
        name={`shares.${index}.partyId`}
        selected={field.value === '' ? null : { id: field.value, name }}
        onBlur={field.onBlur}
        onSelect={(party) => {
          form.setValue(`shares.${index}.partyName`, party?.name ?? '')
          field.onChange(party?.id ?? '')
        }}
      />
      <TextField
        {...form.register(`shares.${index}.sharePpm`)}
        label="Share in %"
        code
        inputMode="decimal"
        autoComplete="off"
      />
      <div className="sm:pt-7">
        <IconButton icon={Trash2} label={`Take out share ${index + 1}`} onClick={onRemove} />
      </div>
      <DateTimeField {...form.register(`shares.${index}.validFrom`)} label="Valid from" kind="date" />
      <DateTimeField {...form.register(`shares.${index}.validTo`)} label="Last day" kind="date" optional />
    </div>
  )
}
