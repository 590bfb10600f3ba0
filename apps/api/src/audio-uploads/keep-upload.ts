import type { ObjectStorage } from '@fieldfare/database'
import type { UploadedFile } from '../http/upload.ts'

/** Stores the file, then records it. When the record fails the stored file goes again, so that nothing half is left. */
export async function keepUpload<Result>(
  storage: ObjectStorage,
  key: string,
  file: UploadedFile,
  record: () => Promise<Result>,
): Promise<Result> {
  await storage.put(key, { filePath: file.path })
  try {
    return await record()
  } catch (error) {
    await storage.remove(key)
    throw error
  }
}
