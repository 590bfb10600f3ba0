import { X } from 'lucide-react'
import { useSyncExternalStore } from 'react'
import { classNames } from '../lib/class-names.ts'
import { dismissToast, listenToToasts, readToasts } from '../lib/toasts.ts'
import { IconButton } from './button.tsx'
import { noticeLook } from './notice.tsx'

/** Where short confirmations appear; a polite live region, so nothing is interrupted. */
export function ToastArea() {
  const toasts = useSyncExternalStore(listenToToasts, readToasts)
  return (
    <div
      role="status"
      aria-live="polite"
      className="no-print pointer-events-none fixed inset-x-3 bottom-3 z-40 grid justify-items-center gap-2 sm:justify-items-end"
    >
      {toasts.map((toast) => {
        const { icon: Icon, ink, edge } = noticeLook[toast.tone]
        return (
          <div
            key={toast.id}
            className={classNames(
              'pointer-events-auto flex max-w-md items-center gap-3 border-l-4 bg-sheet py-1 pr-1 pl-3 shadow-lift',
              edge,
            )}
          >
            <Icon aria-hidden className={classNames('size-5 shrink-0', ink)} />
            <p className="py-1.5">{toast.text}</p>
            <IconButton icon={X} label="Put away" onClick={() => dismissToast(toast.id)} />
          </div>
        )
      })}
    </div>
  )
}
