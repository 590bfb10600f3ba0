import { signIn } from '@fieldfare/contracts'
import { screen, waitFor } from '@testing-library/react'
import userEvent from '@testing-library/user-event'
import { describe, expect, it } from 'vitest'
import { createFakeServer, jsonAnswer, problemAnswer } from '../../testing/fake-server.ts'
import { renderRoutes } from '../../testing/render-page.tsx'
import { sessionOf } from '../../testing/session-fixture.ts'
import { authRoutes } from './routes.tsx'

async function fillIn(email: string, password: string): Promise<void> {
  await userEvent.type(await screen.findByLabelText('E-mail address'), email)
  await userEvent.type(screen.getByLabelText('Password'), password)
  await userEvent.click(screen.getByRole('button', { name: 'Sign in' }))
}

describe('the sign-in page', () => {
  it('signs in and goes back to the page that was asked for', async () => {
    const server = createFakeServer()
    server.handle(signIn, () => jsonAnswer(sessionOf('clerk')))
    const { router } = renderRoutes(authRoutes, { at: '/sign-in?return=%2Flogs%3Fstatus%3Dfailed' })

    await fillIn('Clerk@Example.org', 'long enough words')

    await waitFor(() => expect(router.state.location.pathname).toBe('/logs'))
    expect(router.state.location.search).toBe('?status=failed')
    expect(server.requestsTo(signIn)[0]?.body).toEqual({
      email: 'clerk@example.org',
      password: 'long enough words',
    })
  })

  it('says so when the password is not right, and keeps what was typed', async () => {
    const server = createFakeServer()
    server.handle(signIn, () => problemAnswer('sign-in-failed', { detail: 'Check both and try again.' }))
    renderRoutes(authRoutes, { at: '/sign-in' })

    await fillIn('clerk@example.org', 'wrong')

    expect(await screen.findByRole('alert')).toHaveTextContent('Check both and try again.')
    expect(screen.getByLabelText('E-mail address')).toHaveValue('clerk@example.org')
  })

  it('explains an incomplete address beside its field without asking the server', async () => {
    const server = createFakeServer()
    renderRoutes(authRoutes, { at: '/sign-in' })

    await fillIn('clerk', 'x')

    expect(await screen.findByText('Enter an e-mail address such as name@example.org.')).toBeVisible()
    expect(screen.getByLabelText('E-mail address')).toBeInvalid()
    expect(server.requests).toHaveLength(0)
  })

  it("puts the server's complaint at the field it names", async () => {
    const server = createFakeServer()
    const fieldErrors = [{ path: 'email', message: 'This address is closed.' }]
    server.handle(signIn, () => problemAnswer('validation-failed', { fieldErrors }))
    renderRoutes(authRoutes, { at: '/sign-in' })

    await fillIn('clerk@example.org', 'words')

    expect(await screen.findByText('This address is closed.')).toBeVisible()
    expect(screen.getByLabelText('E-mail address')).toHaveAccessibleDescription('This address is closed.')
  })
})
