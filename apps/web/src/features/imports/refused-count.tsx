import { Count } from '../../components/figures.tsx'
import { StatusTag } from '../../components/status-tag.tsx'

/** Refused rows; they are marked only where there are any. */
export function RefusedCount({ value }: { value: number }) {
  if (value === 0) return <Count value={0} />
  return (
    <StatusTag tone="bad">
      <Count value={value} />
    </StatusTag>
  )
}
