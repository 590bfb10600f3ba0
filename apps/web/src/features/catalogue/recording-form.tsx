import { formatIsrc, recordingInputSchema, workIdSchema, type RecordingView } from '@fieldfare/contracts'
import { useQuery } from '@tanstack/react-query'
import { useState } from 'react'
import { useController } from 'react-hook-form'
import { z } from 'zod'
import { Button } from '../../components/button.tsx'
import { Form, useContractForm, type ContractForm } from '../../components/form.tsx'
import { SearchSelect } from '../../components/search-select.tsx'
import { TextField } from '../../components/text-field.tsx'
import { workChoicesQuery } from './work-choices.ts'
import { lengthToSeconds, secondsToLength } from './length-text.ts'

const lengthSchema = z
  .string()
  .transform((text, context): number | null => {
    if (text.trim() === '') return null
    const seconds = lengthToSeconds(text)
    if (seconds !== null) return seconds
    context.addIssue({ code: 'custom', message: 'Write minutes and seconds, for example 3:45.' })
    return z.NEVER
  })
  .pipe(recordingInputSchema.shape.durationSeconds)

const recordingFormSchema = z.object({
  isrc: recordingInputSchema.shape.isrc,
  title: recordingInputSchema.shape.title,
  artist: recordingInputSchema.shape.artist,
  durationSeconds: lengthSchema,
  workId: z
    .string()
    .transform((id) => (id === '' ? null : id))
    .pipe(workIdSchema.nullable()),
})
type RecordingFormInput = z.input<typeof recordingFormSchema>
export type RecordingFormOutput = z.output<typeof recordingFormSchema>

export type RecordingFormProps = {
  recording: RecordingView | null
  submitLabel: string
  onSave: (values: RecordingFormOutput) => Promise<unknown>
  onCancel: () => void
}

/** What identifies a recording. */
export function RecordingForm({ recording, submitLabel, onSave, onCancel }: RecordingFormProps) {
  const form = useContractForm(recordingFormSchema, {
    defaultValues: {
      isrc: recording === null ? '' : formatIsrc(recording.isrc),
      title: recording?.title ?? '',
      artist: recording?.artist ?? '',
      durationSeconds:
        typeof recording?.durationSeconds === 'number' ? secondsToLength(recording.durationSeconds) : '',
      workId: recording?.work?.id ?? '',
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
      <TextField
        {...form.register('isrc')}
        label="ISRC"
        hint="Two letters, three letters or figures, seven figures; with or without dashes."
        code
        autoComplete="off"
      />
      <TextField {...form.register('title')} label="Title" autoComplete="off" />
      <TextField {...form.register('artist')} label="Artist" autoComplete="off" />
      <TextField
        {...form.register('durationSeconds')}
        label="Length"
        hint="Minutes and seconds, for example 3:45. Left empty, it is read from the reference audio."
        optional
        code
        autoComplete="off"
      />
      <WorkField form={form} present={recording?.work?.title ?? ''} />
    </Form>
  )
}

function WorkField({
  form,
  present,
}: {
  form: ContractForm<RecordingFormInput, RecordingFormOutput>
  present: string
}) {
  const [search, setSearch] = useState('')
  const [title, setTitle] = useState(present)
  const works = useQuery(workChoicesQuery(search))
  const { field } = useController({ control: form.control, name: 'workId' })
  return (
    <SearchSelect
      label="Work"
      hint="The composition that is played. Without one, money for works is held back."
      optional
      name="workId"
      placeholder="Title or ISWC"
      selected={field.value === '' ? null : { id: field.value, label: title }}
      onSelect={(option) => {
        setTitle(option?.label ?? '')
        field.onChange(option?.id ?? '')
      }}
      onBlur={field.onBlur}
      options={(works.data?.items ?? []).map((work) => ({
        id: work.id,
        label: work.title,
        detail: work.creators === '' ? undefined : work.creators,
      }))}
      isFetching={works.isFetching}
      onSearch={setSearch}
    />
  )
}
