import { ChevronLeft, ChevronRight } from 'lucide-react'
import { formatMonth, shiftMonth } from '../lib/format-time.ts'
import { IconButton } from './button.tsx'

export type MonthStepperProps = { month: string; onChange: (month: string) => void; latest?: string }

/** The month a page is about, with steps to its neighbours. */
export function MonthStepper({ month, onChange, latest }: MonthStepperProps) {
  return (
    <div role="group" aria-label="Month" className="flex items-center border border-edge bg-sheet">
      <IconButton icon={ChevronLeft} label="Previous month" onClick={() => onChange(shiftMonth(month, -1))} />
      <span aria-live="polite" className="min-w-36 text-center font-serif text-lg">
        {formatMonth(month)}
      </span>
      <IconButton
        icon={ChevronRight}
        label="Next month"
        disabled={latest !== undefined && month >= latest}
        onClick={() => onChange(shiftMonth(month, 1))}
      />
    </div>
  )
}
