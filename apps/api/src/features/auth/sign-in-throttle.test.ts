import RedisMock from 'ioredis-mock'
import { beforeEach, describe, expect, it } from 'vitest'
import { createSignInThrottle, type SignInThrottle } from './sign-in-throttle.ts'

const person = { account: 'clerk@example.org', ip: '192.0.2.1' }

let redis: InstanceType<typeof RedisMock>
let throttle: SignInThrottle

beforeEach(async () => {
  redis = new RedisMock()
  await redis.flushall()
  throttle = createSignInThrottle(redis, 'test')
})

async function admitTimes(count: number, who = person): Promise<void> {
  for (let attempt = 0; attempt < count; attempt += 1) await throttle.admit(who)
}

describe('createSignInThrottle', () => {
  it('admits five attempts and refuses the sixth, saying how long to wait', async () => {
    await admitTimes(5)
    await expect(throttle.admit(person)).rejects.toMatchObject({ code: 'too-many-attempts' })
    await expect(throttle.admit(person)).rejects.toHaveProperty('retryAfterSeconds', expect.closeTo(900, -1))
  })

  it('counts each address of a person apart, so that nobody locks out a colleague', async () => {
    await admitTimes(5)
    await expect(throttle.admit({ ...person, ip: '192.0.2.2' })).resolves.toBeUndefined()
  })

  it('refuses an address that tries many accounts', async () => {
    for (let account = 0; account < 60; account += 1) {
      await throttle.admit({ account: `person-${account}@example.org`, ip: person.ip })
    }
    await expect(throttle.admit({ account: 'another@example.org', ip: person.ip })).rejects.toMatchObject({
      code: 'too-many-attempts',
    })
  })

  it('starts again after a right password', async () => {
    await admitTimes(4)
    await throttle.forgive(person)
    await expect(admitTimes(5)).resolves.toBeUndefined()
  })

  it('keeps no e-mail address in Redis', async () => {
    await throttle.admit(person)
    const keys = await redis.keys('*')
    expect(keys).toHaveLength(2)
    expect(keys.join()).not.toContain('clerk')
  })

  it('keeps counting in memory while Redis is away', async () => {
    redis.disconnect()
    const away = createSignInThrottle(new RedisMock({ lazyConnect: true, enableOfflineQueue: false }), 'away')
    for (let attempt = 0; attempt < 5; attempt += 1) await away.admit(person)
    await expect(away.admit(person)).rejects.toMatchObject({ code: 'too-many-attempts' })
  })
})
