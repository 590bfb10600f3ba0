import { useSyncExternalStore } from 'react'

export const themeChoices = ['system', 'light', 'dark'] as const
export type ThemeChoice = (typeof themeChoices)[number]

const STORAGE_KEY = 'fieldfare-theme'
const listeners = new Set<() => void>()

function isThemeChoice(value: string | null): value is ThemeChoice {
  return themeChoices.some((choice) => choice === value)
}

export function readThemeChoice(): ThemeChoice {
  const stored = localStorage.getItem(STORAGE_KEY)
  return isThemeChoice(stored) ? stored : 'system'
}

/** Puts the choice on the page; the stylesheet does the rest through color-scheme. */
export function applyThemeChoice(choice: ThemeChoice): void {
  if (choice === 'system') delete document.documentElement.dataset['theme']
  else document.documentElement.dataset['theme'] = choice
}

export function chooseTheme(choice: ThemeChoice): void {
  if (choice === 'system') localStorage.removeItem(STORAGE_KEY)
  else localStorage.setItem(STORAGE_KEY, choice)
  applyThemeChoice(choice)
  for (const listener of listeners) listener()
}

function listen(listener: () => void): () => void {
  listeners.add(listener)
  const system = window.matchMedia('(prefers-color-scheme: dark)')
  system.addEventListener('change', listener)
  return () => {
    listeners.delete(listener)
    system.removeEventListener('change', listener)
  }
}

export function useThemeChoice(): ThemeChoice {
  return useSyncExternalStore(listen, readThemeChoice)
}

function shownTheme(): 'light' | 'dark' {
  const choice = readThemeChoice()
  if (choice !== 'system') return choice
  return window.matchMedia('(prefers-color-scheme: dark)').matches ? 'dark' : 'light'
}

/** The theme now shown, for what is drawn by script, such as canvases. */
export function useShownTheme(): 'light' | 'dark' {
  return useSyncExternalStore(listen, shownTheme)
}
