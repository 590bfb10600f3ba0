import { createNumberList } from './growable.ts'
import { pairPeaks, type PairingOptions } from './landmarks.ts'
import { engineParameters } from './parameters.ts'
import { createPeakStore } from './peak-store.ts'
import { createPeakPicker } from './peaks.ts'
import { createSpectrumAnalyser } from './spectrum.ts'

/** Landmarks in order of time: hash n was found at frame n of the second list. */
export type Landmarks = { readonly hashes: Uint32Array; readonly frames: Uint32Array }

/** Turns the samples of a reference recording into landmarks, however the stream is cut into blocks. */
export type LandmarkExtractor = {
  readonly push: (samples: Float32Array) => void
  readonly finish: () => void
  /** Gives and forgets the landmarks found so far. */
  readonly drain: () => Landmarks
  /** Samples taken so far; divided by the sample rate, the length of the recording. */
  readonly sampleCount: () => number
}

const REFERENCE_PAIRING: PairingOptions = {
  maximumRank: 0,
  fanOut: engineParameters.referenceFanOut,
  speedRatio: 1,
  pitchFollowsSpeed: false,
  boundaryMargin: 0,
}

const BATCH_FRAMES = 256

/** Extracts the landmarks of a reference recording from mono samples at engineParameters.sampleRateHz. */
export function createLandmarkExtractor(): LandmarkExtractor {
  const peaks = createPeakStore()
  const picker = createPeakPicker(peaks.add)
  const spectrum = createSpectrumAnalyser(engineParameters.frameSamples, engineParameters.hopSamples)
  const hashes = createNumberList(1024)
  const frames = createNumberList(1024)
  let pairedFrames = 0
  let sampleCount = 0

  const pairUpTo = (frame: number): void => {
    pairPeaks(peaks, pairedFrames, frame, REFERENCE_PAIRING, (hash, anchorFrame) => {
      hashes.push(hash)
      frames.push(Math.max(0, Math.round(anchorFrame)))
    })
    pairedFrames = frame
    peaks.dropBefore(frame)
  }
  const onRow = (power: Float32Array): void => {
    picker.push(power)
    const ready = picker.completeFrames() - engineParameters.maximumFrameDistance - 2
    if (ready >= pairedFrames + BATCH_FRAMES) pairUpTo(pairedFrames + BATCH_FRAMES)
  }

  return {
    push(samples) {
      sampleCount += samples.length
      spectrum.push(samples, onRow)
    },
    finish() {
      spectrum.finish(onRow)
      picker.finish()
      pairUpTo(picker.completeFrames() + 1)
    },
    drain() {
      const drained = {
        hashes: Uint32Array.from(hashes.toArray()),
        frames: Uint32Array.from(frames.toArray()),
      }
      hashes.clear()
      frames.clear()
      return drained
    },
    sampleCount: () => sampleCount,
  }
}
