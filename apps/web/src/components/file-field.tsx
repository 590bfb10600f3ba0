import { FileAudio, Upload, X } from 'lucide-react'
import { useRef, useState, type DragEvent } from 'react'
import { classNames } from '../lib/class-names.ts'
import { formatBytes } from '../lib/format.ts'
import { Button, IconButton } from './button.tsx'
import { FieldShell, useFieldWiring, type FieldLook } from './field-shell.tsx'

export type FileFieldProps = FieldLook & {
  /** Accepted types as the file dialog wants them, for example ".wav,.mp3". */
  accept?: string
  multiple?: boolean
  files: readonly File[]
  onFilesChange: (files: File[]) => void
  disabled?: boolean
}

/** Choose or drop files; what was chosen is listed with its size and can be taken out again. */
export function FileField({
  label,
  hint,
  error,
  optional,
  name,
  accept,
  multiple = false,
  files,
  onFilesChange,
  disabled = false,
}: FileFieldProps) {
  const field = useFieldWiring({ label, hint, error, name })
  const input = useRef<HTMLInputElement>(null)
  const [isOver, setIsOver] = useState(false)

  const take = (chosen: FileList | null) => {
    const list = Array.from(chosen ?? [])
    if (list.length > 0) onFilesChange(multiple ? [...files, ...list] : list.slice(0, 1))
  }
  const handleDrop = (event: DragEvent) => {
    event.preventDefault()
    setIsOver(false)
    if (!disabled) take(event.dataTransfer.files)
  }

  return (
    <FieldShell
      id={field.wiring.id}
      label={label}
      hint={hint}
      error={field.error}
      optional={optional === true}
    >
      {/* eslint-disable-next-line jsx-a11y/no-static-element-interactions -- dropping is a shortcut; the button does the same */}
      <div
        onDragOver={(event) => {
          event.preventDefault()
          setIsOver(true)
        }}
        onDragLeave={() => setIsOver(false)}
        onDrop={handleDrop}
        className={classNames(
          'flex flex-wrap items-center gap-3 rounded-md border border-dashed p-3',
          isOver ? 'border-chestnut bg-band' : 'border-edge bg-sheet',
        )}
      >
        <input
          ref={input}
          {...field.wiring}
          name={name}
          type="file"
          accept={accept}
          multiple={multiple}
          disabled={disabled}
          className="sr-only"
          tabIndex={-1}
          onChange={(event) => {
            take(event.currentTarget.files)
            event.currentTarget.value = ''
          }}
        />
        <Button icon={Upload} disabled={disabled} onClick={() => input.current?.click()}>
          {multiple ? 'Choose files' : 'Choose a file'}
        </Button>
        <span className="text-sm text-slate">or drop {multiple ? 'them' : 'it'} here</span>
      </div>
      <ChosenFiles files={files} disabled={disabled} onFilesChange={onFilesChange} />
    </FieldShell>
  )
}

function ChosenFiles({
  files,
  disabled,
  onFilesChange,
}: Pick<FileFieldProps, 'files' | 'onFilesChange'> & { disabled: boolean }) {
  if (files.length === 0) return null
  return (
    <ul className="divide-y divide-hairline border-b border-hairline">
      {files.map((file) => (
        <li key={`${file.name} ${file.size} ${file.lastModified}`} className="flex items-center gap-2 py-0.5">
          <FileAudio aria-hidden className="size-4 shrink-0 text-slate" />
          <span className="min-w-0 grow break-all">{file.name}</span>
          <span className="figures text-slate">{formatBytes(file.size)}</span>
          <IconButton
            icon={X}
            label={`Take out ${file.name}`}
            disabled={disabled}
            onClick={() => onFilesChange(files.filter((other) => other !== file))}
          />
        </li>
      ))}
    </ul>
  )
}
