import type { QueryClient } from '@tanstack/react-query'

/** First part of every query key: the kind of thing the data is about. */
export type QueryScope =
  | 'account'
  | 'administration'
  | 'detections'
  | 'disputes'
  | 'distributions'
  | 'imports'
  | 'logs'
  | 'months'
  | 'overview'
  | 'parties'
  | 'plays'
  | 'recordings'
  | 'reference-audio'
  | 'statements'
  | 'stations'
  | 'works'

/**
 * Fetches anew whatever is shown of these features. A change in one feature shows in others (a review changes
 * plays), and features do not import each other, so they meet by name here.
 */
export async function refreshScopes(queryClient: QueryClient, ...scopes: QueryScope[]): Promise<void> {
  await queryClient.invalidateQueries({
    predicate: ({ queryKey }) => scopes.some((scope) => scope === queryKey[0]),
  })
}
