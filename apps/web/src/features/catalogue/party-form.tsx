import { formatIpi, partyInputSchema, readIpi, type PartyView } from '@fieldfare/contracts'
import { useWatch } from 'react-hook-form'
import type { z } from 'zod'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { Notice } from '../../components/notice.tsx'
import { TextField } from '../../components/text-field.tsx'

export type PartyFormProps = {
  party: PartyView | null
  submitLabel: string
  onSave: (values: z.output<typeof partyInputSchema>) => Promise<unknown>
  onCancel: () => void
}

/** Name and IPI of a party. A doubtful IPI is pointed out, never refused. */
export function PartyForm({ party, submitLabel, onSave, onCancel }: PartyFormProps) {
  const ipi = party?.ipi ?? null
  const form = useContractForm(partyInputSchema, {
    defaultValues: { name: party?.name ?? '', ipi: ipi === null ? '' : formatIpi(ipi) },
  })
  const typed = useWatch({ control: form.control, name: 'ipi' })
  return (
    <Form
      form={form}
      onSubmit={onSave}
      actions={
        <>
          <Button type="submit" tone="main" busy={form.formState.isSubmitting}>
            {submitLabel}
          </Button>
          <Button onClick={onCancel}>Cancel</Button>
        </>
      }
    >
      <TextField {...form.register('name')} label="Name" autoComplete="off" />
      <TextField
        {...form.register('ipi')}
        label="IPI name number"
        hint="Up to eleven figures. The last two check the others."
        optional
        code
        inputMode="numeric"
        autoComplete="off"
      />
      {isDoubtful(typed) && (
        <Notice tone="warn" title="The check digits of this IPI do not fit" announce>
          It can be saved as it is: some numbers in use fail the check. Compare it with the document it came
          from first.
        </Notice>
      )}
    </Form>
  )
}

function isDoubtful(typed: unknown): boolean {
  if (typeof typed !== 'string' || typed.trim() === '') return false
  const reading = readIpi(typed)
  return reading.ok && !reading.checkOk
}
