import { serverEventSchema, type ServerEvent } from '@fieldfare/contracts'
import type { Redis } from 'ioredis'

const CHANNEL = 'fieldfare:progress'

/** Tells every API process what a worker is doing. Lost when nobody listens: progress is never the record. */
export async function publishProgress(redis: Redis, event: ServerEvent): Promise<void> {
  await redis.publish(CHANNEL, JSON.stringify(serverEventSchema.parse(event)))
}

export type ProgressSubscription = { close: () => Promise<void> }

function parseEvent(message: string): ServerEvent | null {
  try {
    return serverEventSchema.safeParse(JSON.parse(message)).data ?? null
  } catch {
    return null
  }
}

/**
 * Listens on a connection of its own, which Redis demands of subscribers. What is not a progress message is left out.
 */
export async function subscribeToProgress(
  redis: Redis,
  listener: (event: ServerEvent) => void,
): Promise<ProgressSubscription> {
  const subscriber = redis.duplicate()
  // ioredis reconnects and subscribes again by itself; without a listener the error would end the process.
  subscriber.on('error', () => undefined)
  subscriber.on('message', (_channel: string, message: string) => {
    const event = parseEvent(message)
    if (event !== null) listener(event)
  })
  await subscriber.subscribe(CHANNEL)
  return {
    async close() {
      subscriber.disconnect()
    },
  }
}
