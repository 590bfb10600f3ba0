import { roleLabels, signOut } from '@fieldfare/contracts'
import { useQueryClient } from '@tanstack/react-query'
import { LogOut, Menu, UserRound, X } from 'lucide-react'
import { useEffect, useRef, useState } from 'react'
import { Link, NavLink, Outlet, useLocation, useNavigate } from 'react-router'
import { Button } from '../components/button.tsx'
import { ThemeSwitch } from '../components/theme-switch.tsx'
import { Wordmark } from '../components/wordmark.tsx'
import { callApi } from '../lib/api-client.ts'
import { describeFailure } from '../lib/api-problem.ts'
import { classNames } from '../lib/class-names.ts'
import { useSession } from '../lib/session.ts'
import { SocietyContext } from '../lib/society.tsx'
import { showToast } from '../lib/toasts.ts'
import { navigationFor } from './navigation.ts'

/** The frame of every page for those signed in: a rail beside it on wide screens, a bar with a menu on narrow ones. */
export function Shell() {
  const session = useSession()
  const { pathname } = useLocation()
  const [menuPath, setMenuPath] = useState<string | null>(null)
  // The menu belongs to the page it was opened on, so that going anywhere closes it.
  const isMenuOpen = menuPath === pathname
  return (
    <SocietyContext value={session.society}>
      <a
        href="#page"
        className="sr-only z-50 bg-action px-4 py-2 text-on-action focus:not-sr-only focus:fixed focus:top-2 focus:left-2"
      >
        Skip to the page
      </a>
      <div className="md:grid md:grid-cols-[15rem_minmax(0,1fr)]">
        <header className="no-print border-hairline bg-band max-md:sticky max-md:top-0 max-md:z-30 max-md:border-b md:border-r">
          <div className="md:sticky md:top-0 md:flex md:h-dvh md:flex-col md:overflow-y-auto">
            <div className="flex items-center justify-between px-4 py-2.5 md:px-6 md:pt-6 md:pb-5">
              <Link to="/" aria-label="Fieldfare, start page">
                <Wordmark />
              </Link>
              <div className="md:hidden">
                <Button
                  tone="quiet"
                  icon={isMenuOpen ? X : Menu}
                  aria-expanded={isMenuOpen}
                  aria-controls="menu"
                  onClick={() => setMenuPath(isMenuOpen ? null : pathname)}
                >
                  Menu
                </Button>
              </div>
            </div>
            <div
              id="menu"
              className={classNames(
                'grow flex-col max-md:max-h-[80dvh] max-md:overflow-y-auto max-md:border-t max-md:border-hairline md:flex',
                isMenuOpen ? 'flex' : 'max-md:hidden',
              )}
            >
              <MainNavigation />
              <WhoIsHere />
            </div>
          </div>
        </header>
        <PageFrame />
      </div>
    </SocietyContext>
  )
}

function MainNavigation() {
  const { user, hasLocalInbox } = useSession()
  return (
    <nav aria-label="Main" className="grid content-start gap-5 py-3">
      {navigationFor(user.role, hasLocalInbox).map((group) => (
        <div key={group.label}>
          <h2 className="px-6 pb-1 font-sans text-[0.8125rem] font-semibold text-slate max-md:px-4">
            {group.label}
          </h2>
          <ul>
            {group.items.map(({ to, label, icon: Icon }) => (
              <li key={to}>
                <NavLink
                  to={to}
                  end={to === '/'}
                  className={({ isActive }) =>
                    classNames(
                      'flex min-h-9 items-center gap-3 border-l-4 py-1 pr-4 pl-5 -outline-offset-2! max-md:min-h-11 max-md:pl-3',
                      isActive
                        ? 'border-chestnut bg-band-strong font-semibold text-ink'
                        : 'border-transparent text-ink hover:bg-band-strong',
                    )
                  }
                >
                  <Icon aria-hidden className="size-4.5 shrink-0 text-slate" strokeWidth={1.75} />
                  {label}
                </NavLink>
              </li>
            ))}
          </ul>
        </div>
      ))}
    </nav>
  )
}

function WhoIsHere() {
  const { user, society } = useSession()
  const queryClient = useQueryClient()
  const navigate = useNavigate()
  const leave = async () => {
    try {
      await callApi(signOut)
    } catch (error) {
      showToast(describeFailure(error).detail, 'bad')
      return
    }
    queryClient.clear()
    await navigate('/sign-in')
  }
  return (
    <div className="mt-auto grid gap-2 border-t border-hairline px-6 py-4 max-md:px-4">
      <p className="leading-snug">
        <span className="block font-semibold break-words">{user.name}</span>
        <span className="block text-sm text-slate">{roleLabels[user.role]}</span>
        <span className="block text-sm text-slate">{society.name}</span>
      </p>
      <ThemeSwitch compact />
      <div className="-ml-2 flex flex-wrap">
        <Link
          to="/account"
          className="inline-flex min-h-9 items-center gap-2 px-2 text-sm font-semibold text-chestnut hover:text-chestnut-deep"
        >
          <UserRound aria-hidden className="size-4" />
          Account
        </Link>
        <button
          type="button"
          onClick={() => void leave()}
          className="inline-flex min-h-9 items-center gap-2 px-2 text-sm font-semibold text-chestnut hover:text-chestnut-deep"
        >
          <LogOut aria-hidden className="size-4" />
          Sign out
        </button>
      </div>
    </div>
  )
}

/** The page itself; the focus comes here after going to another page, so that its heading is read next. */
function PageFrame() {
  const { pathname } = useLocation()
  const main = useRef<HTMLElement>(null)
  const lastPath = useRef(pathname)
  useEffect(() => {
    if (lastPath.current === pathname) return
    lastPath.current = pathname
    main.current?.focus({ preventScroll: true })
  }, [pathname])
  return (
    <main
      ref={main}
      id="page"
      tabIndex={-1}
      className="mx-auto w-full max-w-[112rem] min-w-0 px-4 py-6 outline-none md:px-8 md:py-8 xl:px-12"
    >
      <Outlet />
    </main>
  )
}
