export type ToastTone = 'calm' | 'good' | 'warn' | 'bad'
export type Toast = { id: number; tone: ToastTone; text: string }

const SHOWN_MS = 8_000

let toasts: readonly Toast[] = []
let lastId = 0
const listeners = new Set<() => void>()

function change(next: readonly Toast[]): void {
  toasts = next
  for (const listener of listeners) listener()
}

/** Confirms in a short sentence what was just done. Failures belong beside the field or in a Notice. */
export function showToast(text: string, tone: ToastTone = 'good'): void {
  lastId += 1
  const id = lastId
  change([...toasts, { id, tone, text }].slice(-3))
  setTimeout(() => dismissToast(id), SHOWN_MS)
}

export function dismissToast(id: number): void {
  change(toasts.filter((toast) => toast.id !== id))
}

export function readToasts(): readonly Toast[] {
  return toasts
}

export function listenToToasts(listener: () => void): () => void {
  listeners.add(listener)
  return () => {
    listeners.delete(listener)
  }
}
