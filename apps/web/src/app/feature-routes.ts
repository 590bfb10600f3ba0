import type { RouteObject } from 'react-router'
import { accountRoutes } from '../features/account/routes.tsx'

/** The start page of those whose work begins with the month. */
export const homeRoutes: RouteObject[] = []

/** Pages inside the shell. A new feature adds its routes here; see features/account/routes.tsx for the form. */
export const shellRoutes: RouteObject[] = [...accountRoutes]
