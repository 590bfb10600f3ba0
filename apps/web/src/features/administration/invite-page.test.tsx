import {
  inviteUser,
  listParties,
  listStations,
  listUsers,
  stationViewSchema,
  userViewSchema,
} from '@fieldfare/contracts'
import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { beforeEach, describe, expect, it } from 'vitest'
import { createFakeServer, problemAnswer, type FakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { administrationRoutes } from './routes.tsx'

const costa = stationViewSchema.parse({
  id: '40000000-0000-4000-8000-000000000001',
  callName: 'RCST',
  name: 'Radio Costa',
  timeZone: 'Europe/Lisbon',
  contactEmail: null,
  licences: [],
  canUpload: false,
  canEdit: true,
})
const invited = userViewSchema.parse({
  id: '70000000-0000-4000-8000-000000000001',
  email: 'rui@example.org',
  name: 'Rui Costa',
  role: 'uploader',
  status: 'invited',
  stations: [{ id: costa.id, name: costa.name }],
  parties: [],
  createdAt: '2026-12-01T08:00:00Z',
  lastSignInAt: null,
})

let server: FakeServer

async function fillInPerson() {
  renderRoutes(administrationRoutes, { at: '/users/new', role: 'admin' })
  await userEvent.type(await screen.findByRole('textbox', { name: 'E-mail address' }), 'rui@example.org')
  await userEvent.type(screen.getByRole('textbox', { name: 'Name' }), 'Rui Costa')
}

async function send() {
  await userEvent.click(screen.getByRole('button', { name: 'Send the invitation' }))
}

beforeEach(() => {
  server = createFakeServer()
  server.answer(listStations, { items: [costa] })
  server.answer(listParties, { items: [], total: 0, page: 1, pageSize: 20 })
  server.answer(listUsers, { items: [invited], total: 1, page: 1, pageSize: 50 })
  server.answer(inviteUser, invited)
})

describe('inviting a person', () => {
  it('needs a station for a log uploader', async () => {
    await fillInPerson()
    await send()
    expect(await screen.findByText('A log uploader needs at least one station.')).toBeInTheDocument()
    expect(server.requestsTo(inviteUser)).toHaveLength(0)

    await userEvent.click(screen.getByRole('checkbox', { name: 'Radio Costa (RCST)' }))
    await send()
    expect(await screen.findByText('The invitation to rui@example.org is on its way.')).toBeInTheDocument()
    expect(server.requestsTo(inviteUser)[0]?.body).toEqual({
      email: 'rui@example.org',
      name: 'Rui Costa',
      role: 'uploader',
      stationIds: [costa.id],
      partyIds: [],
    })
  })

  it('needs a party for a publisher', async () => {
    await fillInPerson()
    await userEvent.click(screen.getByRole('radio', { name: /^Publisher/ }))
    await send()
    expect(await screen.findByText('A publisher needs at least one party.')).toBeInTheDocument()
    expect(server.requestsTo(inviteUser)).toHaveLength(0)
  })

  it('sends no scope that was chosen for another role', async () => {
    await fillInPerson()
    await userEvent.click(await screen.findByRole('checkbox', { name: 'Radio Costa (RCST)' }))
    await userEvent.click(screen.getByRole('radio', { name: /^Auditor/ }))
    await send()
    await screen.findByText('The invitation to rui@example.org is on its way.')
    expect(server.requestsTo(inviteUser)[0]?.body).toMatchObject({ role: 'auditor', stationIds: [] })
  })

  it('shows at the field that an address is taken', async () => {
    await fillInPerson()
    await userEvent.click(screen.getByRole('radio', { name: /^Auditor/ }))
    server.handle(inviteUser, () =>
      problemAnswer('conflict', { fieldErrors: [{ path: 'email', message: 'Rui Costa has an account.' }] }),
    )
    await send()
    expect(await screen.findByText('Rui Costa has an account.')).toBeInTheDocument()
    expect(screen.getByRole('textbox', { name: 'E-mail address' })).toBeInvalid()
  })
})
