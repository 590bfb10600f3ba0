import { Monitor, Moon, Sun, type LucideIcon } from 'lucide-react'
import { classNames } from '../lib/class-names.ts'
import { chooseTheme, themeChoices, useThemeChoice, type ThemeChoice } from '../lib/theme.ts'

const looks = {
  system: { label: 'As the system', icon: Monitor },
  light: { label: 'Light', icon: Sun },
  dark: { label: 'Dark', icon: Moon },
} as const satisfies Record<ThemeChoice, { label: string; icon: LucideIcon }>

/** System, light or dark; remembered by this browser. */
export function ThemeSwitch({ compact = false }: { compact?: boolean }) {
  const chosen = useThemeChoice()
  return (
    <fieldset className="inline-flex w-fit border border-edge bg-sheet">
      <legend className="sr-only">Light or dark</legend>
      {themeChoices.map((choice) => {
        const { label, icon: Icon } = looks[choice]
        return (
          <label
            key={choice}
            title={label}
            className={classNames(
              'flex min-h-9 items-center gap-2 px-2.5 has-focus-visible:outline-2 has-focus-visible:outline-focus',
              choice === chosen ? 'bg-band-strong font-semibold text-ink' : 'text-slate hover:text-ink',
            )}
          >
            <input
              type="radio"
              name={compact ? 'theme-compact' : 'theme'}
              value={choice}
              checked={choice === chosen}
              onChange={() => chooseTheme(choice)}
              className="sr-only"
            />
            <Icon aria-hidden className="size-4" />
            <span className={compact ? 'sr-only' : ''}>{label}</span>
          </label>
        )
      })}
    </fieldset>
  )
}
