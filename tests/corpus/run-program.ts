import { spawn } from 'node:child_process'

export type ProgramOptions = { readonly cwd?: string; readonly input?: Uint8Array }

/** Runs a program to its end and returns its output. @throws Error with its last words when it fails. */
export function runProgram(
  program: string,
  args: readonly string[],
  { cwd, input }: ProgramOptions = {},
): Promise<Buffer> {
  return new Promise((resolve, reject) => {
    const child = spawn(program, [...args], { cwd, stdio: ['pipe', 'pipe', 'pipe'] })
    const output: Buffer[] = []
    let complaints = ''
    child.stdout.on('data', (chunk: Buffer) => output.push(chunk))
    child.stderr.on('data', (chunk: Buffer) => {
      complaints = (complaints + chunk.toString()).slice(-500)
    })
    // A program that stops reading early says why by its exit code.
    child.stdin.on('error', () => undefined)
    child.stdin.end(input)
    child.on('error', reject)
    child.on('close', (code) => {
      if (code === 0) resolve(Buffer.concat(output))
      else reject(new Error(`${program} ended with ${String(code)}: ${complaints.trim()}`))
    })
  })
}
