import { Outlet, ScrollRestoration, useNavigation } from 'react-router'
import { ToastArea } from '../components/toast-area.tsx'

/** Round every page: scroll position, the line that shows a page is being fetched, short confirmations. */
export function RootLayout() {
  const isMoving = useNavigation().state !== 'idle'
  return (
    <>
      {isMoving && (
        <div
          aria-hidden
          className="fixed inset-x-0 top-0 z-50 h-0.5 animate-pulse bg-action [animation-delay:150ms]"
        />
      )}
      <Outlet />
      <ToastArea />
      <ScrollRestoration />
    </>
  )
}
