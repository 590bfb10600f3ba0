import { screen } from '@testing-library/react'
import { describe, expect, it } from 'vitest'
import { renderElement } from '../../testing/render-page.tsx'
import { MailText, ownPath } from './mail-text.tsx'

describe('ownPath', () => {
  it.each([
    ['https://desk.example.org/invitation#abc', 'https://desk.example.org', '/invitation#abc'],
    ['http://localhost:4300/disputes/7?x=1', 'http://127.0.0.1:5173', '/disputes/7?x=1'],
    ['https://elsewhere.example.org/disputes/7', 'https://desk.example.org', null],
    ['http://not a link', 'https://desk.example.org', null],
  ])('of %s seen from %s', (text, origin, path) => {
    expect(ownPath(text, origin)).toBe(path)
  })
})

describe('MailText', () => {
  it('links addresses of the application and leaves others as text', async () => {
    const own = `${window.location.origin}/disputes/7`
    renderElement(<MailText text={`Read it:\n${own}\nor https://elsewhere.example.org/x`} />)
    expect(await screen.findByRole('link', { name: own })).toHaveAttribute('href', '/disputes/7')
    expect(screen.getAllByRole('link')).toHaveLength(1)
  })
})
