import { createServer } from 'node:net'

const LOOPBACK = '127.0.0.1'

/** A loopback port nobody listens on at this moment. */
export async function findFreePort(): Promise<number> {
  const port = await listenOnce(0)
  if (port === undefined) throw new Error('The system offers no free port.')
  return port
}

export async function isPortFree(port: number): Promise<boolean> {
  return (await listenOnce(port)) !== undefined
}

/** The first free port at or after `firstPort`, so that the address stays a familiar one. */
export async function findFreePortFrom(firstPort: number): Promise<number> {
  for (let port = firstPort; port < firstPort + 100; port += 1) {
    if (await isPortFree(port)) return port
  }
  return findFreePort()
}

function listenOnce(port: number): Promise<number | undefined> {
  return new Promise((resolve) => {
    const server = createServer()
    server.once('error', () => resolve(undefined))
    server.listen(port, LOOPBACK, () => {
      const address = server.address()
      const bound = typeof address === 'object' && address !== null ? address.port : undefined
      server.close(() => resolve(bound))
    })
  })
}
