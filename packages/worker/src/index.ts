export { startWorker, type RunningWorker } from './worker.ts'
