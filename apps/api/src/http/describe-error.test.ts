import { describe, expect, it } from 'vitest'
import { describeError } from './describe-error.ts'

describe('describeError', () => {
  it('leaves out what a database driver hangs on its errors', () => {
    const refused = Object.assign(new Error('null value in column "name"'), {
      code: '23502',
      detail: 'Failing row contains (nell@example.org, $2b$12$hash)',
    })
    const described = describeError(new Error('could not be saved', { cause: refused }))
    expect(described).toMatchObject({ message: 'could not be saved', cause: { code: '23502' } })
    expect(JSON.stringify(described)).not.toMatch(/nell|hash/)
  })

  it('does not repeat what was thrown and is no error', () => {
    expect(JSON.stringify(describeError({ password: 'hunter2' }))).not.toContain('hunter2')
  })
})
