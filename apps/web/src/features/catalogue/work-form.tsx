import { formatIswc, workInputSchema, type WorkView } from '@fieldfare/contracts'
import type { z } from 'zod'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm } from '../../components/form.tsx'
import { TextField } from '../../components/text-field.tsx'

export type WorkFormProps = {
  work: WorkView | null
  submitLabel: string
  onSave: (values: z.output<typeof workInputSchema>) => Promise<unknown>
  onCancel: () => void
}

/** What identifies a work. */
export function WorkForm({ work, submitLabel, onSave, onCancel }: WorkFormProps) {
  const iswc = work?.iswc ?? null
  const form = useContractForm(workInputSchema, {
    defaultValues: {
      title: work?.title ?? '',
      creators: work?.creators ?? '',
      iswc: iswc === null ? '' : formatIswc(iswc),
    },
  })
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
      <TextField {...form.register('title')} label="Title" autoComplete="off" />
      <TextField
        {...form.register('creators')}
        label="Creators"
        hint="Composers, authors and arrangers, as they are named with the work."
        optional
        autoComplete="off"
      />
      <TextField
        {...form.register('iswc')}
        label="ISWC"
        hint="T, nine figures and a check digit, for example T-034.524.680-1."
        optional
        code
        autoComplete="off"
      />
    </Form>
  )
}
