import { createHash } from 'node:crypto'
import type { Redis } from 'ioredis'
import { RateLimiterMemory, RateLimiterRedis, RateLimiterRes } from 'rate-limiter-flexible'
import { AppError } from '../../http/app-error.ts'

const WINDOW_SECONDS = 15 * 60
const ATTEMPTS_PER_ACCOUNT = 5
const ATTEMPTS_PER_ADDRESS = 60

export type ThrottledPerson = { account: string; ip: string }

/** Slows down guessing: few attempts per account from one address, and not many from one address in all. */
export type SignInThrottle = {
  /** @throws AppError too-many-attempts */
  admit: (person: ThrottledPerson) => Promise<void>
  /** A right password clears the account's count and gives the address its attempt back. */
  forgive: (person: ThrottledPerson) => Promise<void>
}

/** Counts in Redis, shared by all API processes; in memory while Redis is away, so that guessing never goes uncounted. */
export function createSignInThrottle(redis: Redis, purpose: string): SignInThrottle {
  const limiter = (name: string, points: number) =>
    new RateLimiterRedis({
      storeClient: redis,
      keyPrefix: `fieldfare:${purpose}:${name}`,
      points,
      duration: WINDOW_SECONDS,
      insuranceLimiter: new RateLimiterMemory({ points, duration: WINDOW_SECONDS }),
    })
  const perAccount = limiter('account', ATTEMPTS_PER_ACCOUNT)
  const perAddress = limiter('address', ATTEMPTS_PER_ADDRESS)

  async function consume(counter: RateLimiterRedis, key: string): Promise<void> {
    try {
      await counter.consume(key)
    } catch (error) {
      if (!(error instanceof RateLimiterRes)) throw error
      const retryAfterSeconds = Math.max(1, Math.ceil(error.msBeforeNext / 1000))
      throw new AppError('too-many-attempts', {
        detail: `Too many attempts. Try again in ${describeWait(retryAfterSeconds)}.`,
        retryAfterSeconds,
      })
    }
  }

  return {
    async admit({ account, ip }) {
      await consume(perAddress, ip)
      await consume(perAccount, accountKey(account, ip))
    },
    async forgive({ account, ip }) {
      await perAccount.delete(accountKey(account, ip))
      await perAddress.reward(ip)
    },
  }
}

/** Redis holds no e-mail addresses. */
function accountKey(account: string, ip: string): string {
  return createHash('sha256').update(`${account}\n${ip}`).digest('base64url')
}

function describeWait(seconds: number): string {
  const minutes = Math.ceil(seconds / 60)
  return minutes === 1 ? 'a minute' : `${minutes} minutes`
}
