import { Worker } from 'node:worker_threads'
import type { IndexChange, ThreadMessage, ThreadRequest, ThreadResults } from './messages.ts'

/** The audio itself was at fault; `userMessage` says what and what to do. */
export class UnusableAudio extends Error {
  readonly code: string
  readonly userMessage: string

  constructor(code: string, userMessage: string) {
    super(userMessage)
    this.name = 'UnusableAudio'
    this.code = code
    this.userMessage = userMessage
  }
}

type Waiting = { take: (thread: PooledThread) => void }

type PooledThread = { worker: Worker; appliedChanges: number }

export type ThreadPool = {
  /** Runs a task on a free thread, waiting for one when all are busy. */
  fingerprint: (path: string, signal: AbortSignal) => Promise<ThreadResults['fingerprint']>
  buildSegment: (
    entries: readonly { recordingNumber: number; landmarks: Uint8Array }[],
  ) => Promise<ThreadResults['build-segment']>
  /** `changes` is the whole history of the index; each thread is sent what it has not seen. */
  analyse: (
    path: string,
    changes: readonly IndexChange[],
    options: { onProgress: (doneSeconds: number) => void; signal: AbortSignal },
  ) => Promise<ThreadResults['analyse']>
  close: () => Promise<void>
}

const THREAD_FILE = new URL('./thread-entry.mjs', import.meta.url)

type Exchange = { onProgress: (doneSeconds: number) => void; signal: AbortSignal | null }

/** One request and its answer. The thread is ended when the request is aborted or the thread itself dies. */
function exchange(
  { worker }: PooledThread,
  request: ThreadRequest,
  { onProgress, signal }: Exchange,
): Promise<ThreadResults[keyof ThreadResults]> {
  return new Promise((resolve, reject) => {
    const settle = (finish: () => void) => {
      worker.off('message', onMessage)
      worker.off('error', onError)
      worker.off('exit', onExit)
      signal?.removeEventListener('abort', onAbort)
      finish()
    }
    const onMessage = (message: ThreadMessage) => {
      if (message.kind === 'progress') onProgress(message.doneSeconds)
      else if (message.kind === 'done') settle(() => resolve(message.result))
      else if (message.audioError) {
        const { code, userMessage } = message.audioError
        settle(() => reject(new UnusableAudio(code, userMessage)))
      } else settle(() => reject(new ThreadTaskFailed(message.message)))
    }
    const onError = (error: unknown) => settle(() => reject(new ThreadDied(String(error))))
    const onExit = (code: number) => settle(() => reject(new ThreadDied(`exit code ${code}`)))
    const onAbort = () => settle(() => reject(new ThreadDied('the task was called off')))
    worker.on('message', onMessage)
    worker.on('error', onError)
    worker.on('exit', onExit)
    signal?.addEventListener('abort', onAbort, { once: true })
    if (signal?.aborted) onAbort()
    else worker.postMessage(request)
  })
}

/** The task failed inside the thread for a reason that is not the audio. */
export class ThreadTaskFailed extends Error {
  override readonly name = 'ThreadTaskFailed'
}

/** The thread ended before it answered, or was ended. */
export class ThreadDied extends Error {
  override readonly name = 'ThreadDied'
}

function isResult<Task extends keyof ThreadResults>(
  task: Task,
  result: ThreadResults[keyof ThreadResults],
): result is ThreadResults[Task] {
  switch (task) {
    case 'fingerprint':
      return 'landmarkHashes' in result
    case 'build-segment':
      return 'data' in result
    case 'analyse':
      return 'detections' in result
    default:
      return false
  }
}

/** Starts threads that each keep the index. Close the pool to end them. */
export function createThreadPool(size: number, startWorker = () => new Worker(THREAD_FILE)): ThreadPool {
  const all = new Set<PooledThread>()
  const waiting: Waiting[] = []
  let isClosed = false

  /** A thread that dies while it has nothing to do is forgotten; the next task starts another in its place. */
  function startThread(): PooledThread {
    const thread = { worker: startWorker(), appliedChanges: 0 }
    all.add(thread)
    // Whoever waits for an answer hears of an error there; without a listener here an idle one would end the process.
    thread.worker.on('error', () => undefined)
    thread.worker.on('exit', () => {
      all.delete(thread)
      const position = free.indexOf(thread)
      if (position >= 0) free.splice(position, 1)
    })
    return thread
  }

  const free: PooledThread[] = Array.from({ length: size }, startThread)

  function release(thread: PooledThread): void {
    const next = waiting.shift()
    if (next) next.take(thread)
    else free.push(thread)
  }

  function replace(thread: PooledThread): void {
    all.delete(thread)
    void thread.worker.terminate()
    if (!isClosed && all.size < size) release(startThread())
  }

  function acquire(): Promise<PooledThread> {
    const thread = free.pop()
    if (thread) return Promise.resolve(thread)
    if (all.size < size) return Promise.resolve(startThread())
    return new Promise((resolve) => waiting.push({ take: resolve }))
  }

  async function run<Task extends ThreadRequest['task']>(
    task: Task,
    makeRequest: (thread: PooledThread) => ThreadRequest,
    options: Exchange,
  ): Promise<ThreadResults[Task]> {
    const thread = await acquire()
    const result = await exchange(thread, makeRequest(thread), options).catch((error: unknown) => {
      if (error instanceof ThreadDied) replace(thread)
      else release(thread)
      throw error
    })
    release(thread)
    if (!isResult(task, result)) throw new Error(`The thread answered another question than ${task}`)
    return result
  }

  const quiet: Exchange = { onProgress: () => undefined, signal: null }
  return {
    fingerprint: (path, signal) =>
      run('fingerprint', () => ({ task: 'fingerprint', path }), { ...quiet, signal }),
    buildSegment: (entries) => run('build-segment', () => ({ task: 'build-segment', entries }), quiet),
    analyse: (path, changes, options) =>
      run(
        'analyse',
        (thread) => {
          const unseen = changes.slice(thread.appliedChanges)
          thread.appliedChanges = changes.length
          return { task: 'analyse', path, changes: unseen }
        },
        options,
      ),
    async close() {
      isClosed = true
      await Promise.all([...all].map(({ worker }) => worker.terminate()))
    },
  }
}
