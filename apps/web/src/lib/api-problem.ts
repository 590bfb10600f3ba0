import { problemSchema, type FieldError, type Problem, type ProblemCode } from '@fieldfare/contracts'

/** What the server answered when a request failed, or what stands in for it when no answer came. */
export class ApiProblem extends Error {
  override readonly name = 'ApiProblem'
  readonly problem: Problem

  constructor(problem: Problem) {
    super(problem.detail)
    this.problem = problem
  }

  get code(): ProblemCode {
    return this.problem.code
  }

  get fieldErrors(): FieldError[] {
    return this.problem.fieldErrors
  }
}

export function isApiProblem(error: unknown): error is ApiProblem {
  return error instanceof ApiProblem
}

/** Reads a problem document; an answer in another shape (a proxy's page, say) becomes 'unavailable'. */
export function problemFromAnswer(status: number, body: unknown): ApiProblem {
  const reading = problemSchema.safeParse(body)
  if (reading.success) return new ApiProblem(reading.data)
  return new ApiProblem({
    type: 'about:blank',
    code: status >= 500 || status === 0 ? 'unavailable' : 'malformed-request',
    title: 'The service did not answer as expected',
    status,
    detail: 'The service did not answer as expected. Try again in a moment.',
    correlationId: 'none',
    fieldErrors: [],
  })
}

export function connectionProblem(): ApiProblem {
  return new ApiProblem({
    type: 'about:blank',
    code: 'unavailable',
    title: 'No connection',
    status: 0,
    detail: 'The service cannot be reached. Check the connection and try again.',
    correlationId: 'none',
    fieldErrors: [],
  })
}

export type FailureText = { title: string; detail: string; reference: string | null }

/** Words for any failure, with the reference that finds it in the server's log. */
export function describeFailure(error: unknown): FailureText {
  if (!isApiProblem(error)) {
    return {
      title: 'This page met something unexpected',
      detail: 'Load it again. If it happens once more, tell an administrator what you were doing.',
      reference: null,
    }
  }
  const { title, detail, correlationId } = error.problem
  return { title, detail, reference: correlationId === 'none' ? null : correlationId }
}
