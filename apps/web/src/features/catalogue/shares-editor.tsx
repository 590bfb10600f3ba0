import type { ShareSet, sharesInputSchema } from '@fieldfare/contracts'
import { Plus } from 'lucide-react'
import { useFieldArray, useWatch } from 'react-hook-form'
import type { z } from 'zod'
import { Button } from '../../components/button.tsx'
import { CheckboxField, ChoiceGroup } from '../../components/choice-field.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { EmptyState } from '../../components/states.tsx'
import { WHOLE_PPM, ppmToPercent } from '../../lib/percent-text.ts'
import { ShareRow } from './share-row.tsx'
import { ShareTotals } from './share-totals.tsx'
import { isIncomplete, sharesFormSchema, totalsOfDraft, type ShareRowInput } from './shares-form.ts'

export type SharesRequest = z.input<typeof sharesInputSchema>

type SharesEditorProps = {
  present: ShareSet['items']
  onSave: (body: SharesRequest) => Promise<unknown>
  onCancel: () => void
}

const emptyRow: ShareRowInput = { partyId: '', partyName: '', sharePpm: '', validFrom: '', validTo: '' }

function rowsOf(present: ShareSet['items']): ShareRowInput[] {
  return present.map(({ party, sharePpm, validFrom, validTo }) => ({
    partyId: party.id,
    partyName: party.name,
    sharePpm: ppmToPercent(sharePpm),
    validFrom,
    validTo: validTo ?? '',
  }))
}

/** All shares of one right at once, with the totals of every stretch of days while they are typed. */
export function SharesEditor({ present, onSave, onCancel }: SharesEditorProps) {
  const form = useContractForm(sharesFormSchema, {
    defaultValues: { shares: rowsOf(present), acceptIncomplete: false },
  })
  const rows = useFieldArray({ control: form.control, name: 'shares' })
  const totals = totalsOfDraft(useWatch({ control: form.control, name: 'shares' }))
  const isOver = totals.some(({ totalPpm }) => totalPpm > WHOLE_PPM)
  const firstDay = form.getValues('shares.0.validFrom')

  return (
    <Form
      form={form}
      onSubmit={({ shares, acceptIncomplete }) =>
        onSave({
          shares: shares.map(({ partyId, sharePpm, validFrom, validTo }) => ({
            partyId,
            sharePpm,
            validFrom,
            validTo,
          })),
          acceptIncomplete,
        })
      }
      actions={
        <>
          <Button type="submit" tone="main" busy={form.formState.isSubmitting} disabled={isOver}>
            Save the shares
          </Button>
          <Button onClick={onCancel}>Cancel</Button>
        </>
      }
    >
      <ChoiceGroup legend="Shares" name="shares">
        {rows.fields.length === 0 && (
          <EmptyState title="No shares">Add the first, or save none to hold everything back.</EmptyState>
        )}
        {rows.fields.map((row, index) => (
          <ShareRow key={row.id} form={form} index={index} onRemove={() => rows.remove(index)} />
        ))}
        <div>
          <Button icon={Plus} onClick={() => rows.append({ ...emptyRow, validFrom: firstDay })}>
            Add a share
          </Button>
        </div>
      </ChoiceGroup>
      <ShareTotals totals={totals} />
      {!isOver && isIncomplete(totals) && (
        <CheckboxField
          {...form.register('acceptIncomplete')}
          label="Hold back the rest"
          hint="What nobody claims is kept on a holdback account, with the reason, until somebody does."
        />
      )}
    </Form>
  )
}
