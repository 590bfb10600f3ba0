import { useEffect, useId, useRef, useState, type ReactNode } from 'react'
import { ErrorState } from './states.tsx'
import { Button } from './button.tsx'

export type ConfirmDialogProps = {
  isOpen: boolean
  /** A question naming the thing: "Approve the distribution of November 2026?" */
  title: string
  children: ReactNode
  /** The verb of the action, never "OK". */
  confirmLabel: string
  tone?: 'main' | 'danger'
  /** The dialog stays open with the reason if this fails. */
  onConfirm: () => Promise<unknown>
  onClose: () => void
}

/** Asks before what cannot be undone. */
export function ConfirmDialog({
  isOpen,
  title,
  children,
  confirmLabel,
  tone = 'danger',
  onConfirm,
  onClose,
}: ConfirmDialogProps) {
  const dialog = useRef<HTMLDialogElement>(null)
  const titleId = useId()
  const [busy, setBusy] = useState(false)
  const [failure, setFailure] = useState<unknown>(null)

  useEffect(() => {
    if (isOpen) dialog.current?.showModal()
    else dialog.current?.close()
  }, [isOpen])

  const confirm = async () => {
    setBusy(true)
    setFailure(null)
    try {
      await onConfirm()
      onClose()
    } catch (error) {
      setFailure(error)
    } finally {
      setBusy(false)
    }
  }

  return (
    <dialog
      ref={dialog}
      aria-labelledby={titleId}
      onClose={() => {
        setFailure(null)
        if (isOpen) onClose()
      }}
      className="m-auto w-[min(34rem,calc(100vw-2rem))] border border-edge bg-paper p-6 text-ink shadow-lift"
    >
      {isOpen && (
        <div className="grid gap-4">
          <h2 id={titleId}>{title}</h2>
          <div className="grid gap-3">{children}</div>
          {failure !== null && <ErrorState error={failure} />}
          <div className="flex flex-wrap justify-end gap-2 border-t border-hairline pt-4">
            <Button onClick={onClose} disabled={busy}>
              Keep as it is
            </Button>
            <Button tone={tone} busy={busy} onClick={() => void confirm()}>
              {confirmLabel}
            </Button>
          </div>
        </div>
      )}
    </dialog>
  )
}
