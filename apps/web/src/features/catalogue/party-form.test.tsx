import { createParty, getParty } from '@fieldfare/contracts'
import { screen } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { createFakeServer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { quim } from './catalogue-fixtures.ts'
import { catalogueRoutes } from './routes.tsx'

describe('adding a party', () => {
  it('warns of an IPI whose check does not fit and saves it all the same', async () => {
    const server = createFakeServer()
    server.answer(createParty, { ...quim, ipiCheckOk: false })
    server.answer(getParty, { ...quim, ipiCheckOk: false })
    renderRoutes(catalogueRoutes, { at: '/parties/new' })
    await userEvent.type(await screen.findByRole('textbox', { name: 'Name' }), 'Quim Publishing')
    await userEvent.type(screen.getByRole('textbox', { name: /IPI name number/ }), '00014107339')
    expect(await screen.findByText('The check digits of this IPI do not fit')).toBeInTheDocument()
    await userEvent.click(screen.getByRole('button', { name: 'Add the party' }))
    expect(await screen.findByText('Quim Publishing is in the catalogue.')).toBeInTheDocument()
    expect(server.requestsTo(createParty)[0]?.body).toEqual({ name: 'Quim Publishing', ipi: '00014107339' })
  })
})
