import { getStatementCsv, getStatementPdf, type StatementSummary } from '@fieldfare/contracts'
import { Download, FileText } from 'lucide-react'
import { DownloadButton } from '../../components/button.tsx'
import { downloadAddress } from '../../lib/endpoint-address.ts'

type StatementFilesProps = { statement: Pick<StatementSummary, 'id' | 'hasPdf' | 'status'>; isMain?: boolean }

/** The statement as PDF and CSV, once it is issued. */
export function StatementFiles({ statement, isMain = false }: StatementFilesProps) {
  if (statement.status !== 'issued' || !statement.hasPdf) return null
  const params = { statementId: statement.id }
  return (
    <span className="flex flex-wrap gap-2">
      <DownloadButton
        tone={isMain ? 'main' : 'quiet'}
        icon={FileText}
        href={downloadAddress(getStatementPdf, { params })}
      >
        PDF
      </DownloadButton>
      <DownloadButton
        tone={isMain ? 'plain' : 'quiet'}
        icon={Download}
        href={downloadAddress(getStatementCsv, { params })}
      >
        CSV
      </DownloadButton>
    </span>
  )
}
