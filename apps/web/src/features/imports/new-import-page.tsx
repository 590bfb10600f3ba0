import { catalogueCsvColumns, importCatalogue } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { Download } from 'lucide-react'
import { useState } from 'react'
import { flushSync } from 'react-dom'
import { useNavigate } from 'react-router'
import { Button } from '../../components/button.tsx'
import { FileField } from '../../components/file-field.tsx'
import { PageHeader, Section } from '../../components/page-header.tsx'
import { ProgressBar } from '../../components/progress-bar.tsx'
import { ErrorState } from '../../components/states.tsx'
import { UnsavedGuard } from '../../components/unsaved-guard.tsx'
import { ScrollRegion } from '../../components/scroll-region.tsx'
import { isApiProblem } from '../../lib/api-problem.ts'
import { formatBytes } from '../../lib/format.ts'
import { showToast } from '../../lib/toasts.ts'
import { uploadFile, type UploadProgress } from '../../lib/upload-file.ts'
import { refreshScopes } from '../../lib/query-scopes.ts'
import { columnMeanings, emptyTemplate } from './csv-columns.ts'

export function NewImportPage() {
  return (
    <>
      <PageHeader
        title="Import a CSV file"
        breadcrumbs={[{ label: 'Imports', to: '/imports' }]}
        lead="Recordings, works, parties and shares from one file. What is in the catalogue already is updated; rows with mistakes are refused one by one and told in the report, the others go in."
      />
      <ImportForm />
      <Section
        title="What the file looks like"
        lead="CSV in UTF-8, columns parted by comma or semicolon, one row a share. A recording with three shares has three rows. Rows without right, party and percentage only describe the recording."
        actions={
          <Button icon={Download} onClick={saveTemplate}>
            Empty template
          </Button>
        }
      >
        <ColumnTable />
      </Section>
    </>
  )
}

/** The refusals that belong beside the file field rather than above the page. */
function messageAtFile(error: unknown): string | null {
  if (!isApiProblem(error)) return null
  const { code, detail } = error.problem
  const atField = error.fieldErrors.find(({ path }) => path.endsWith('file'))
  if (atField !== undefined) return atField.message
  return code === 'file-refused' || code === 'file-too-large' ? detail : null
}

function ImportForm() {
  const navigate = useNavigate()
  const queryClient = useQueryClient()
  const [files, setFiles] = useState<File[]>([])
  const [progress, setProgress] = useState<UploadProgress | null>(null)
  const [failure, setFailure] = useState<unknown>(null)
  const [missing, setMissing] = useState(false)
  const atFile = missing ? 'Choose a file first.' : (messageAtFile(failure) ?? undefined)

  const send = async () => {
    const [file] = files
    setMissing(file === undefined)
    if (file === undefined) return
    setFailure(null)
    setProgress({ sentBytes: 0, totalBytes: file.size, secondsLeft: null })
    try {
      const done = await uploadFile(importCatalogue, { file, onProgress: setProgress })
      void refreshScopes(queryClient, 'imports', 'recordings', 'works', 'parties')
      showToast(`${done.fileName} is imported.`)
      setFiles([])
      // The guard must be gone before the way to the report, or it would ask about what is saved already.
      flushSync(() => setProgress(null))
      await navigate(`/imports/${done.id}`)
    } catch (error) {
      setFailure(error)
    } finally {
      setProgress(null)
    }
  }

  return (
    <div className="grid max-w-2xl gap-4">
      <FileField
        label="CSV file"
        hint="At most 20 MB and 20,000 rows."
        accept=".csv,text/csv"
        error={atFile}
        files={files}
        disabled={progress !== null}
        onFilesChange={(chosen) => {
          setFiles(chosen)
          setFailure(null)
          setMissing(false)
        }}
      />
      {progress !== null && <Sending progress={progress} />}
      {failure !== null && atFile === undefined && <ErrorState error={failure} />}
      <div>
        <Button tone="main" busy={progress !== null} onClick={() => void send()}>
          Import the file
        </Button>
      </div>
      <UnsavedGuard isDirty={progress !== null} />
    </div>
  )
}

function Sending({ progress: { sentBytes, totalBytes, secondsLeft } }: { progress: UploadProgress }) {
  if (totalBytes > 0 && sentBytes >= totalBytes) {
    return <ProgressBar label="Checking and writing the rows" fraction={null} />
  }
  return (
    <ProgressBar
      label="Sending"
      fraction={totalBytes === 0 ? null : sentBytes / totalBytes}
      detail={`${formatBytes(sentBytes)} of ${formatBytes(totalBytes)}`}
      secondsLeft={secondsLeft}
    />
  )
}

function saveTemplate() {
  const address = URL.createObjectURL(emptyTemplate())
  const link = document.createElement('a')
  link.href = address
  link.download = 'catalogue-template.csv'
  link.click()
  URL.revokeObjectURL(address)
}

function ColumnTable() {
  return (
    <ScrollRegion label="Columns of the file, in order">
      <table className="w-full text-[0.95rem]">
        <caption className="sr-only">Columns of the file, in order</caption>
        <thead>
          <tr className="border-b border-ink text-left">
            <th scope="col" className="px-3 py-1.5">
              Column
            </th>
            <th scope="col" className="px-3 py-1.5">
              Needed
            </th>
            <th scope="col" className="px-3 py-1.5">
              What it holds
            </th>
          </tr>
        </thead>
        <tbody>
          {catalogueCsvColumns.map((column) => (
            <tr key={column} className="border-b border-hairline">
              <th scope="row" className="px-3 py-1.5 text-left font-normal">
                <code className="figures">{column}</code>
              </th>
              <td className="px-3 py-1.5 whitespace-nowrap">{columnMeanings[column].needed}</td>
              <td className="min-w-60 px-3 py-1.5">{columnMeanings[column].meaning}</td>
            </tr>
          ))}
        </tbody>
      </table>
    </ScrollRegion>
  )
}
