/** The name in the title face over a short ribbon of airtime: our own mark, nothing else. */
export function Wordmark({ size = 'small' }: { size?: 'small' | 'large' }) {
  return (
    <span className="inline-grid w-fit gap-1">
      <span
        className={
          size === 'large'
            ? 'font-serif text-5xl leading-none font-medium tracking-tight sm:text-6xl'
            : 'font-serif text-[1.65rem] leading-none font-medium tracking-tight'
        }
      >
        Fieldfare
      </span>
      <RibbonMotif className={size === 'large' ? 'h-3 w-full' : 'h-1.5 w-full'} />
    </span>
  )
}

const strands = [
  { x: 0, width: 18, token: 'var(--color-slate)' },
  { x: 20, width: 31, token: 'var(--color-air-play)' },
  { x: 52, width: 9, token: 'var(--color-air-review)' },
  { x: 64, width: 4, token: 'var(--color-slate)' },
  { x: 70, width: 22, token: 'var(--color-air-play)' },
  { x: 93, width: 7, token: 'var(--color-air-review)' },
] as const

function RibbonMotif({ className }: { className: string }) {
  return (
    <svg aria-hidden viewBox="0 0 100 4" preserveAspectRatio="none" className={className}>
      {strands.map((strand) => (
        <rect key={strand.x} x={strand.x} width={strand.width} height="4" style={{ fill: strand.token }} />
      ))}
    </svg>
  )
}
