import { createContext, use } from 'react'
import type { SessionView } from '@fieldfare/contracts'

export type Society = SessionView['society']

/** The society's currency and zone, given to every page inside the shell. */
export const SocietyContext = createContext<Society | null>(null)

export function useSociety(): Society | null {
  return use(SocietyContext)
}
