import { mkdir } from 'node:fs/promises'
import { join } from 'node:path'

/** Where an instance keeps what. */
export type DataDirectory = {
  readonly root: string
  readonly cluster: string
  readonly logs: string
  readonly storage: string
  readonly cache: string
  readonly lockFile: string
  readonly tokenSecretFile: string
  readonly demoStateFile: string
  readonly demoSignInsFile: string
}

export async function prepareDataDirectory(root: string): Promise<DataDirectory> {
  const data = {
    root,
    cluster: join(root, 'cluster'),
    logs: join(root, 'logs'),
    storage: join(root, 'storage'),
    cache: join(root, 'cache'),
    lockFile: join(root, 'lock'),
    tokenSecretFile: join(root, 'token-secret'),
    demoStateFile: join(root, 'demo-state'),
    demoSignInsFile: join(root, 'demo-sign-ins.json'),
  }
  // The user postgres passes through on its way to the cluster; nobody else may look into the rest.
  await mkdir(root, { recursive: true, mode: 0o711 })
  for (const directory of [data.logs, data.storage, data.cache]) {
    await mkdir(directory, { recursive: true, mode: 0o700 })
  }
  return data
}
