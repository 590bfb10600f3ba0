export { airBroadcast, type Broadcast, type Item, type Play } from './broadcast.ts'
export { cacheFolder } from './cache-folder.ts'
export { fetchDebianMusic, type MusicTrack } from './debian-music.ts'
export { createRandom, noise, shuffled, type Random } from './random.ts'
export {
  buildRealMusicLog,
  type RealMusicLog,
  type RealMusicLogOptions,
  type ScheduledTrack,
} from './real-music-log.ts'
export { runProgram } from './run-program.ts'
export {
  concatenated,
  CORPUS_RATE_HZ,
  decodeSamples,
  filterSamples,
  levelled,
  loudnessOf,
  mixed,
  writeMp3,
  type Samples,
} from './samples.ts'
export { createSpeech } from './speech.ts'
