import { useEffect, type ReactNode } from 'react'
import { useBlocker } from 'react-router'
import { ConfirmDialog } from './confirm-dialog.tsx'

/** Asks before leaving a page with changes that were not saved, inside the application and when the tab closes. */
export function UnsavedGuard({
  isDirty,
  title = 'Leave without saving?',
  confirmLabel = 'Leave and lose the changes',
  children = <p>What you changed on this page has not been saved.</p>,
}: {
  isDirty: boolean
  title?: string
  confirmLabel?: string
  children?: ReactNode
}) {
  const blocker = useBlocker(
    ({ currentLocation, nextLocation }) => isDirty && currentLocation.pathname !== nextLocation.pathname,
  )

  useEffect(() => {
    if (!isDirty) return undefined
    const warn = (event: BeforeUnloadEvent) => event.preventDefault()
    window.addEventListener('beforeunload', warn)
    return () => window.removeEventListener('beforeunload', warn)
  }, [isDirty])

  return (
    <ConfirmDialog
      isOpen={blocker.state === 'blocked'}
      title={title}
      confirmLabel={confirmLabel}
      onConfirm={async () => blocker.proceed?.()}
      onClose={() => {
        if (blocker.state === 'blocked') blocker.reset()
      }}
    >
      {children}
    </ConfirmDialog>
  )
}
