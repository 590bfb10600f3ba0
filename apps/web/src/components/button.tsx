import { LoaderCircle, type LucideIcon } from 'lucide-react'
import type { ComponentProps, ReactNode } from 'react'
import { Link, type LinkProps } from 'react-router'
import { classNames } from '../lib/class-names.ts'

export type ButtonTone = 'main' | 'plain' | 'quiet' | 'danger'

const base =
  'inline-flex min-h-10 items-center justify-center gap-2 rounded-md px-3.5 py-1.5 text-[0.95rem] leading-tight font-semibold transition-colors duration-100 aria-disabled:cursor-not-allowed aria-disabled:opacity-60 disabled:cursor-not-allowed disabled:opacity-60'

const tones = {
  main: 'border border-action bg-action text-on-action hover:border-action-deep hover:bg-action-deep',
  plain: 'border border-edge bg-sheet text-ink hover:border-chestnut hover:text-chestnut',
  quiet: 'border border-transparent px-2 text-chestnut hover:bg-band hover:text-chestnut-deep',
  danger: 'border border-bad bg-sheet text-bad hover:bg-bad-ground',
} as const satisfies Record<ButtonTone, string>

export type ButtonProps = Omit<ComponentProps<'button'>, 'className'> & {
  tone?: ButtonTone
  icon?: LucideIcon
  /** Shows that the action runs and refuses a second press. */
  busy?: boolean
  children: ReactNode
}

export function Button({
  tone = 'plain',
  icon: Icon,
  busy = false,
  children,
  disabled,
  ...rest
}: ButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      className={classNames(base, tones[tone], 'no-print')}
      disabled={disabled === true || busy}
      aria-busy={busy}
    >
      {busy ? (
        <LoaderCircle aria-hidden className="size-4 animate-spin" />
      ) : (
        Icon !== undefined && <Icon aria-hidden className="size-4 shrink-0" />
      )}
      {children}
    </button>
  )
}

export type IconButtonProps = Omit<ComponentProps<'button'>, 'className' | 'children' | 'aria-label'> & {
  icon: LucideIcon
  label: string
}

/** A button of one icon; the label is read out and shown on hover. */
export function IconButton({ icon: Icon, label, ...rest }: IconButtonProps) {
  return (
    <button
      type="button"
      {...rest}
      aria-label={label}
      title={label}
      className="no-print inline-flex size-10 shrink-0 items-center justify-center rounded-md text-slate hover:bg-band hover:text-ink disabled:cursor-not-allowed disabled:opacity-50"
    >
      <Icon aria-hidden className="size-5" />
    </button>
  )
}

type LinkLook = { tone?: ButtonTone; icon?: LucideIcon; children: ReactNode }

/** Looks like a button, goes to a page of the application. */
export function LinkButton({
  tone = 'plain',
  icon: Icon,
  children,
  ...rest
}: LinkLook & Omit<LinkProps, 'className'>) {
  return (
    <Link {...rest} className={classNames(base, tones[tone], 'no-print')}>
      {Icon !== undefined && <Icon aria-hidden className="size-4 shrink-0" />}
      {children}
    </Link>
  )
}

/** Looks like a button, fetches a file from the server. */
export function DownloadButton({ tone = 'plain', icon: Icon, children, href }: LinkLook & { href: string }) {
  return (
    <a href={href} download className={classNames(base, tones[tone], 'no-print')}>
      {Icon !== undefined && <Icon aria-hidden className="size-4 shrink-0" />}
      {children}
    </a>
  )
}
