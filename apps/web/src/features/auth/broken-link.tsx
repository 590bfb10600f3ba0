import { LinkButton } from '../../components/button.tsx'
import { AuthLayout } from './auth-layout.tsx'

/** A link without its secret, most often cut by a mail program. */
export function BrokenLink({ title, children }: { title: string; children: string }) {
  return (
    <AuthLayout title={title} lead={children}>
      <div className="flex flex-wrap gap-2">
        <LinkButton tone="main" to="/sign-in">
          Go to sign-in
        </LinkButton>
        <LinkButton to="/forgotten-password">Ask for a new link</LinkButton>
      </div>
    </AuthLayout>
  )
}
