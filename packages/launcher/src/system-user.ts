import { execFile } from 'node:child_process'
import { promisify } from 'node:util'

import { LaunchError } from './launch-error.ts'

const run = promisify(execFile)

/** A user of the system that root can start programs as. */
export type SystemUser = {
  readonly userId: number
  readonly groupId: number
  /** Arguments of setpriv(1) that become this user. */
  readonly privilegeArguments: readonly string[]
}

export function isRoot(): boolean {
  return process.getuid?.() === 0
}

/** @throws {@link LaunchError} when the system has no such user */
export async function findSystemUser(name: string): Promise<SystemUser> {
  try {
    const [userId, groupId] = await Promise.all([run('id', ['-u', name]), run('id', ['-g', name])])
    return describeUser(Number(userId.stdout), Number(groupId.stdout))
  } catch {
    throw new LaunchError(`This system has no user "${name}", as whom PostgreSQL runs when root starts it.`)
  }
}

export function describeUser(userId: number, groupId: number): SystemUser {
  return {
    userId,
    groupId,
    privilegeArguments: ['--reuid', String(userId), '--regid', String(groupId), '--clear-groups'],
  }
}

/** Whether that user may enter `directory` and write there, decided by trying. */
export async function canUseDirectory(user: SystemUser, directory: string): Promise<boolean> {
  const test = ['test', '-x', directory, '-a', '-w', directory]
  return run('setpriv', [...user.privilegeArguments, '--', ...test]).then(
    () => true,
    () => false,
  )
}
