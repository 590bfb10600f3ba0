import type { ReactNode } from 'react'

/** Lets what is wider than the screen scroll on its own; takes the focus so that arrow keys can do it (WCAG 2.1.1). */
export function ScrollRegion({ label, children }: { label: string; children: ReactNode }) {
  return (
    <div
      role="region"
      aria-label={label}
      // eslint-disable-next-line jsx-a11y/no-noninteractive-tabindex -- the comment above
      tabIndex={0}
      className="print-whole overflow-x-auto"
    >
      {children}
    </div>
  )
}
