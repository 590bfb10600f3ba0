import type { StorageConfiguration } from '../configuration.ts'
import { createDiskStorage } from './disk-storage.ts'
import type { ObjectStorage } from './object-storage.ts'
import { createS3Storage } from './s3-storage.ts'

/** Opens the storage that the configuration names. */
export function createStorage(configuration: StorageConfiguration): ObjectStorage {
  return configuration.kind === 'disk'
    ? createDiskStorage(configuration.directory)
    : createS3Storage(configuration)
}
