import { LinkButton } from '../components/button.tsx'
import { PageHeader } from '../components/page-header.tsx'

export function NotFoundPage() {
  return (
    <>
      <PageHeader
        title="There is no page here"
        lead="The address may be mistyped, or what it led to was moved."
      />
      <LinkButton tone="main" to="/">
        Go to the start page
      </LinkButton>
    </>
  )
}
