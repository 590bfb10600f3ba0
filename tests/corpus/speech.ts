import { join } from 'node:path'
import { tmpdir } from 'node:os'
import { mkdtemp, rm } from 'node:fs/promises'
import type { Random } from './random.ts'
import { runProgram } from './run-program.ts'
import { concatenated, CORPUS_RATE_HZ, decodeSamples, levelled, type Samples } from './samples.ts'

const VOICES = ['en', 'en+f3', 'en+m3', 'en-us+f2', 'en-us+m5'] as const
const SENTENCES = [
  'Good evening and welcome back. The council met on Tuesday to discuss the new bridge over the river, and residents were not amused.',
  'Traffic is heavy on the northern ring road this morning, with delays of up to twenty minutes near the old brewery.',
  'The weather tomorrow will be mostly dry, with a light wind from the west and sixteen degrees in the afternoon.',
  'In sport, the home side drew two all after a late penalty, and the manager praised three remarkable saves.',
  'You can write to us at the usual address, and we read every letter, even the ones about the birds at dawn.',
] as const

/** Speaks every sentence with every voice (Debian's espeak-ng). */
async function speakAll(): Promise<Samples[]> {
  const folder = await mkdtemp(join(tmpdir(), 'speech-'))
  try {
    const spoken: Samples[] = []
    for (const voice of VOICES) {
      for (const sentence of SENTENCES) {
        const path = join(folder, 'sentence.wav')
        await runProgram('espeak-ng', ['-v', voice, '-s', '155', '-w', path, sentence])
        spoken.push(levelled(await decodeSamples(path)))
      }
    }
    return spoken
  } finally {
    await rm(folder, { recursive: true, force: true })
  }
}

/** Gives speech of any length, sentences in random order. */
export async function createSpeech(random: Random): Promise<(seconds: number) => Samples> {
  const sentences = await speakAll()
  const pause = new Float32Array(Math.round(CORPUS_RATE_HZ / 4))
  return (seconds) => {
    const wanted = Math.round(seconds * CORPUS_RATE_HZ)
    const parts: Samples[] = []
    for (let length = 0; length < wanted;) {
      const sentence = sentences[Math.floor(random() * sentences.length)] ?? pause
      parts.push(sentence, pause)
      length += sentence.length + pause.length
    }
    return concatenated(parts).subarray(0, wanted)
  }
}
