import { roles } from '@fieldfare/contracts'
import { describe, expect, it } from 'vitest'
import { homeByRole, navigationFor } from './navigation.ts'

function addressesFor(role: (typeof roles)[number], hasLocalInbox = false): string[] {
  return navigationFor(role, hasLocalInbox).flatMap((group) => group.items.map((item) => item.to))
}

describe('the menu', () => {
  it('gives an uploader the airtime of their stations and no money', () => {
    expect(addressesFor('uploader')).toEqual(['/stations', '/logs', '/detections', '/plays'])
  })

  it('gives a publisher what concerns their parties', () => {
    expect(addressesFor('publisher')).toEqual(expect.arrayContaining(['/plays', '/statements', '/disputes']))
    expect(addressesFor('publisher')).not.toContain('/logs')
  })

  it('keeps user administration to administrators', () => {
    expect(roles.filter((role) => addressesFor(role).includes('/users'))).toEqual(['admin'])
  })

  it('shows the inbox only where mail stays here', () => {
    expect(addressesFor('admin', true)).toContain('/inbox')
    expect(addressesFor('admin', false)).not.toContain('/inbox')
  })

  it.each(roles)('has the start page of %s in it', (role) => {
    expect(addressesFor(role)).toContain(homeByRole[role])
  })
})
