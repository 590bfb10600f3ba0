import { QueryClient } from '@tanstack/react-query'
import { isApiProblem } from './api-problem.ts'

/** Only an unreachable or unready service is worth asking again; a refusal stays a refusal. */
function shouldRetry(failureCount: number, error: Error): boolean {
  return isApiProblem(error) && error.code === 'unavailable' && failureCount < 2
}

export function createQueryClient(): QueryClient {
  return new QueryClient({
    defaultOptions: {
      queries: { retry: shouldRetry, staleTime: 10_000, refetchOnWindowFocus: false },
      mutations: { retry: false },
    },
  })
}
