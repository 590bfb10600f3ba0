import type { DetectionDetail } from '@fieldfare/contracts'
import { formatCount } from '../../lib/format.ts'

const HIGHEST_CONFIDENCE = 99

const largeNumbers = ['ten', 'a hundred', 'a thousand', '10,000', '100,000', 'a million'] as const

/** What the confidence means: how much other music would have to be heard for one such find by chance. */
export function explainConfidence(confidence: number): string {
  if (confidence >= HIGHEST_CONFIDENCE) {
    return 'As good as certain: less than one false alarm as strong as this in 10 to the 99 hours of log.'
  }
  const power = Math.floor(confidence)
  if (power < 1) return 'Weak: a false alarm as strong as this is expected every few hours of log.'
  const hours = largeNumbers[power - 1] ?? `10 to the ${power}`
  return `About one false alarm as strong as this is expected in ${hours} hours of log.`
}

/** How the broadcast speed compares with the reference. */
export function explainSpeed(speedRatio: number): string {
  const percent = (speedRatio - 1) * 100
  if (Math.abs(percent) < 0.05) return 'The speed of the reference'
  return `${Math.abs(percent).toFixed(1)} % ${percent > 0 ? 'faster' : 'slower'} than the reference`
}

export type EvidencePair = DetectionDetail['evidence'][number]

/** How far an agreeing moment lies from where the alignment puts it, in seconds of the reference. */
export function deviationOf(pair: EvidencePair, detection: DetectionDetail): number {
  const { logStartSeconds, referenceStartSeconds, speedRatio } = detection
  return pair.referenceSeconds - (referenceStartSeconds + (pair.logSeconds - logStartSeconds) * speedRatio)
}

/** The alignment plot in a sentence, for those who cannot see it. */
export function describeAlignment(detection: DetectionDetail): string {
  const { evidence, agreeingHashes } = detection
  if (evidence.length === 0) return 'No agreeing moments are kept for this detection.'
  const largest = Math.max(...evidence.map((pair) => Math.abs(deviationOf(pair, detection))))
  return `${formatCount(agreeingHashes)} moments agree, ${formatCount(evidence.length)} of them drawn. They lie on one line, none further than ${largest.toFixed(2)}\u00a0s from it: the same sounds in the same order at the same pace.`
}
