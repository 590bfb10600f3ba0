import type { RouteObject } from 'react-router'

export const statementsRoutes: RouteObject[] = [
  {
    path: 'statements',
    lazy: async () => ({ Component: (await import('./statements-page.tsx')).StatementsPage }),
  },
  {
    path: 'statements/:statementId',
    lazy: async () => ({ Component: (await import('./statement-page.tsx')).StatementPage }),
  },
  {
    path: 'statements/:statementId/lines/:lineNumber',
    lazy: async () => ({ Component: (await import('./statement-line-page.tsx')).StatementLinePage }),
  },
]
