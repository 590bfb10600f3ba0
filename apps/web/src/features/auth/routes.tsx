import type { RouteObject } from 'react-router'

/** Pages open to everyone, outside the shell. */
export const authRoutes: RouteObject[] = [
  { path: 'sign-in', lazy: async () => ({ Component: (await import('./sign-in-page.tsx')).SignInPage }) },
  {
    path: 'forgotten-password',
    lazy: async () => ({ Component: (await import('./forgotten-password-page.tsx')).ForgottenPasswordPage }),
  },
  {
    path: 'password-reset',
    lazy: async () => ({ Component: (await import('./reset-password-page.tsx')).ResetPasswordPage }),
  },
  {
    path: 'invitation',
    lazy: async () => ({ Component: (await import('./invitation-page.tsx')).InvitationPage }),
  },
]
