import { sessionViewSchema, type Role, type SessionView } from '@fieldfare/contracts'

/** Somebody signed in, for tests that need no more than a role. */
export function sessionOf(role: Role): SessionView {
  return sessionViewSchema.parse({
    user: {
      id: '5f0c3a52-6a0e-4f6e-9c31-0d9d6a1b7e01',
      email: 'person@example.org',
      name: 'Person Under Test',
      role,
      stations: [],
      parties: [],
    },
    society: { name: 'Test Society', currency: 'EUR', currencyDigits: 2, timeZone: 'Europe/Lisbon' },
    hasLocalInbox: true,
  })
}
