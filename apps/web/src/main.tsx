import './lib/zod-without-eval.ts'
import { StrictMode } from 'react'
import { createRoot } from 'react-dom/client'
import './app/index.css'
import { Providers } from './app/providers.tsx'
import { createAppRouter } from './app/router.tsx'
import { createQueryClient } from './lib/query-client.ts'
import { applyThemeChoice, readThemeChoice } from './lib/theme.ts'

applyThemeChoice(readThemeChoice())

const container = document.getElementById('root')
if (container === null) throw new Error('The page has no element to draw into.')

const queryClient = createQueryClient()
createRoot(container).render(
  <StrictMode>
    <Providers queryClient={queryClient} router={createAppRouter(queryClient)} />
  </StrictMode>,
)
