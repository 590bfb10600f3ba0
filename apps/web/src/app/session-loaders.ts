import type { QueryClient } from '@tanstack/react-query'
import { redirect, type LoaderFunctionArgs } from 'react-router'
import type { SessionView } from '@fieldfare/contracts'
import { isApiProblem } from '../lib/api-problem.ts'
import { hasSessionCookie } from '../lib/csrf.ts'
import { signInAddress } from '../lib/return-address.ts'
import { sessionQuery } from '../lib/session.ts'
import { homeByRole } from './navigation.ts'

/** Null where nobody is signed in. */
async function loadSession(queryClient: QueryClient): Promise<SessionView | null> {
  // Without the companion cookie nobody can be signed in here; asking would only log a failed request.
  if (!hasSessionCookie()) return null
  try {
    return await queryClient.query({ ...sessionQuery(), staleTime: 'static' })
  } catch (error) {
    if (isApiProblem(error) && error.problem.status === 401) return null
    throw error
  }
}

/** Loads who is signed in before a page inside the shell is drawn; otherwise the way leads to sign-in and back. */
export function requireSession(queryClient: QueryClient) {
  return async ({ request }: LoaderFunctionArgs): Promise<Response | null> => {
    const session = await loadSession(queryClient)
    return session === null ? redirect(signInAddress(new URL(request.url))) : null
  }
}

/** The start page is the month for those who work on it; the others go to theirs. */
export function goHome(queryClient: QueryClient) {
  return async (): Promise<Response | null> => {
    const session = await loadSession(queryClient)
    // Without a session the loader of the shell has the say.
    const home = session === null ? '/' : homeByRole[session.user.role]
    return home === '/' ? null : redirect(home)
  }
}
