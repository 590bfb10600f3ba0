import { useRouteError } from 'react-router'
import { Button, LinkButton } from '../components/button.tsx'
import { ErrorState } from '../components/states.tsx'
import { isApiProblem } from '../lib/api-problem.ts'
import { NotFoundPage } from './not-found-page.tsx'

/** A page failed; the shell around it stays. */
export function PageError() {
  const error = useRouteError()
  if (isApiProblem(error) && error.code === 'not-found') return <NotFoundPage />
  return (
    <ErrorState
      error={error}
      onRetry={() => window.location.reload()}
      action={<LinkButton to="/">Go to the start page</LinkButton>}
    />
  )
}

/** The shell itself failed, most often because the service does not answer. */
export function WholePageError() {
  const error = useRouteError()
  return (
    <main className="mx-auto grid min-h-dvh max-w-2xl content-center gap-6 p-4">
      <h1>Fieldfare cannot be shown now</h1>
      <ErrorState
        error={error}
        action={<Button onClick={() => window.location.reload()}>Load again</Button>}
      />
    </main>
  )
}
