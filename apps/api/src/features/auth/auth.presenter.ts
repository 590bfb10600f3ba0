import type { SessionDetails } from './auth.service.ts'

/** The session as the web application reads it: every field named, so that a new column never leaks. */
export function presentSession({ user, society, hasLocalInbox }: SessionDetails) {
  return {
    user: {
      id: user.id,
      email: user.email,
      name: user.name,
      role: user.role,
      stations: user.stations,
      parties: user.parties,
    },
    society: {
      name: society.name,
      currency: society.currency,
      currencyDigits: society.currencyDigits,
      timeZone: society.timeZone,
    },
    hasLocalInbox,
  }
}
