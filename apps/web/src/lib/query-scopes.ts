import type { QueryClient } from '@tanstack/react-query'

/** First part of every query key: the feature the data belongs to. */
export type QueryScope =
  | 'account'
  | 'administration'
  | 'catalogue'
  | 'detections'
  | 'disputes'
  | 'distributions'
  | 'logs'
  | 'overview'
  | 'plays'
  | 'statements'
  | 'stations'

/**
 * Fetches anew whatever is shown of these features. A change in one feature shows in others (a review changes
 * plays), and features do not import each other, so they meet by name here.
 */
export async function refreshScopes(queryClient: QueryClient, ...scopes: QueryScope[]): Promise<void> {
  await queryClient.invalidateQueries({
    predicate: ({ queryKey }) => scopes.some((scope) => scope === queryKey[0]),
  })
}
