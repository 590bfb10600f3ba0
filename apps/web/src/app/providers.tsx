import { QueryClientProvider, type QueryClient } from '@tanstack/react-query'
import { useEffect } from 'react'
import { RouterProvider } from 'react-router'
import { signInAddress } from '../lib/return-address.ts'
import { onSessionEnd } from '../lib/session-refresh.ts'
import type { createAppRouter } from './router.tsx'

type ProvidersProps = { queryClient: QueryClient; router: ReturnType<typeof createAppRouter> }

const openPages = ['/sign-in', '/forgotten-password', '/password-reset', '/invitation']

export function Providers({ queryClient, router }: ProvidersProps) {
  useEffect(
    () =>
      onSessionEnd(() => {
        const here = router.state.location
        if (openPages.includes(here.pathname)) return
        queryClient.clear()
        void router.navigate(signInAddress(here), { replace: true })
      }),
    [queryClient, router],
  )
  return (
    <QueryClientProvider client={queryClient}>
      <RouterProvider router={router} />
    </QueryClientProvider>
  )
}
