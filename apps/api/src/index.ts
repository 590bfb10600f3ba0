export { startApi, type RunningApi } from './server.ts'
