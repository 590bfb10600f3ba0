import '@testing-library/jest-dom/vitest'
import { cleanup, configure } from '@testing-library/react'
import { afterEach, vi } from 'vitest'

// A busy machine is no reason for a test to fail; a page that never answers still is.
configure({ asyncUtilTimeout: 10_000 })
vi.setConfig({ testTimeout: 30_000 })

// jsdom draws nothing, measures nothing and has no dialogs: these are the pieces components rely on.
HTMLCanvasElement.prototype.getContext = () => null
HTMLDialogElement.prototype.showModal = function showModal() {
  this.open = true
}
HTMLDialogElement.prototype.close = function close() {
  this.open = false
  this.dispatchEvent(new Event('close'))
}

class StillObserver implements ResizeObserver {
  observe(): void {
    // Nothing changes its size in jsdom.
  }
  unobserve(): void {
    // Nothing was observed.
  }
  disconnect(): void {
    // Nothing was observed.
  }
}
vi.stubGlobal('ResizeObserver', StillObserver)
vi.stubGlobal('matchMedia', (query: string) => ({
  matches: false,
  media: query,
  addEventListener: () => undefined,
  removeEventListener: () => undefined,
}))

afterEach(() => {
  cleanup()
  localStorage.clear()
})
