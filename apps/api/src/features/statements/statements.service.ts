import type { StatementId } from '@fieldfare/contracts'
import type { PageRequest, Scope } from '@fieldfare/database'
import { AppError, notFound } from '../../http/app-error.ts'
import type { Dependencies } from '../../http/dependencies.ts'
import { storedFile, type FileAnswer } from '../../http/file-answer.ts'
import {
  hasStatementLine,
  listPlaysOfLine,
  listStatementLines,
  readStatementParts,
  type StatementLineFilter,
} from './statement-parts.repository.ts'
import {
  findStatement,
  findStatementFile,
  listStatements,
  type StatementFilter,
  type StatementRow,
} from './statements.repository.ts'

const mediaTypes = { pdf: 'application/pdf', csv: 'text/csv; charset=utf-8' } as const

export function createStatementsService({ database, storage }: Dependencies) {
  async function demand(scope: Scope, id: StatementId): Promise<StatementRow> {
    const statement = await findStatement(database, scope, id)
    if (statement === null) throw notFound('This statement')
    return statement
  }

  return {
    list: (scope: Scope, filter: StatementFilter & PageRequest) => listStatements(database, scope, filter),

    async read(scope: Scope, id: StatementId) {
      const statement = await demand(scope, id)
      return { statement, parts: await readStatementParts(database, id) }
    },

    async lines(scope: Scope, id: StatementId, filter: StatementLineFilter & PageRequest) {
      await demand(scope, id)
      return listStatementLines(database, id, filter)
    },

    async playsOfLine(scope: Scope, id: StatementId, lineNumber: number, page: PageRequest) {
      await demand(scope, id)
      if (!(await hasStatementLine(database, id, lineNumber))) throw notFound('This line')
      return listPlaysOfLine(database, id, lineNumber, page)
    },

    /** Files are made when the month is issued, and never before: a draft is not a statement. */
    async file(scope: Scope, id: StatementId, kind: 'pdf' | 'csv'): Promise<FileAnswer> {
      const statement = await demand(scope, id)
      const key = statement.isIssued ? await findStatementFile(database, id, kind) : null
      if (key === null) {
        throw new AppError('not-found', {
          detail: 'This statement has no file yet. It is made when the month is issued.',
        })
      }
      return storedFile({
        mediaType: mediaTypes[kind],
        fileName: `statement-${statement.number}.${kind}`,
        disposition: 'attachment',
        storage,
        key,
      })
    },
  }
}
