import { Percent } from '../../components/figures.tsx'
import { StatusTag } from '../../components/status-tag.tsx'
import { WHOLE_PPM } from './percent-text.ts'

/** What the shares valid today come to, and what that means for the money. */
export function ClaimedToday({ ppm }: { ppm: number }) {
  if (ppm === WHOLE_PPM) return <StatusTag tone="good">100 % claimed</StatusTag>
  if (ppm > WHOLE_PPM) {
    return (
      <StatusTag tone="bad">
        <span>
          <Percent ppm={ppm} decimals={4} /> claimed
        </span>
      </StatusTag>
    )
  }
  return (
    <StatusTag tone="warn">
      {ppm === 0 ? (
        'Nothing claimed'
      ) : (
        <span>
          <Percent ppm={ppm} decimals={4} /> claimed
        </span>
      )}
    </StatusTag>
  )
}

/** The same in a sentence. */
export function ClaimedSentence({ ppm }: { ppm: number }) {
  if (ppm === WHOLE_PPM) return <>100 % is claimed today.</>
  if (ppm > WHOLE_PPM) {
    return (
      <>
        <Percent ppm={ppm} decimals={4} /> is claimed today, which is more than there is. Everything is held
        back until this is settled.
      </>
    )
  }
  return (
    <>
      <Percent ppm={ppm} decimals={4} /> is claimed today; <Percent ppm={WHOLE_PPM - ppm} decimals={4} /> is
      held back.
    </>
  )
}
