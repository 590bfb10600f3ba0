/** What can be wrong with a recording; each has one meaning that a caller may act on. */
export type AudioErrorCode =
  | 'unreadable-file'
  | 'empty-file'
  | 'unrecognised-format'
  | 'no-audio-stream'
  | 'absurd-header'
  | 'undecodable'
  | 'no-samples'
  | 'too-long'
  | 'decoder-missing'
  | 'encoding-failed'

/**
 * A recording that cannot be used. `userMessage` is written for the person who sent the file: what is wrong with it
 * and what to do. `message` adds the technical detail for the log.
 */
export class AudioError extends Error {
  readonly code: AudioErrorCode
  readonly userMessage: string

  constructor(code: AudioErrorCode, userMessage: string, detail?: string, options?: ErrorOptions) {
    super(detail ? `${userMessage} [${detail}]` : userMessage, options)
    this.name = 'AudioError'
    this.code = code
    this.userMessage = userMessage
  }
}

export function emptyFile(): AudioError {
  return new AudioError(
    'empty-file',
    'The file is empty. The recording or the upload did not complete; please send it again.',
  )
}

export function unrecognisedFormat(): AudioError {
  return new AudioError(
    'unrecognised-format',
    'This is not an audio file we can read, whatever its name says. Please send MP3, WAV, FLAC, Ogg (Vorbis or Opus), M4A or AAC.',
  )
}

export function noSamples(): AudioError {
  return new AudioError(
    'no-samples',
    'The file is audio but holds no sound at all: its length is zero. Please check the recorder and send the recording again.',
  )
}

export function undecodable(detail: string): AudioError {
  return new AudioError(
    'undecodable',
    'The audio in this file is damaged and could not be played. Please export or copy it again and send the new file.',
    detail,
  )
}

export function absurdHeader(detail: string): AudioError {
  return new AudioError(
    'absurd-header',
    'The file describes itself in a way no real recording does, so it was refused. Please export it again from the recorder.',
    detail,
  )
}

export function decoderMissing(program: string): AudioError {
  return new AudioError(
    'decoder-missing',
    `This kind of audio needs the program ${program}, which is not installed on the server. Please tell the administrator.`,
  )
}

export function encodingFailed(detail: string, options?: ErrorOptions): AudioError {
  return new AudioError(
    'encoding-failed',
    'The audio could not be written on the server. Please try again; if it happens again, tell the administrator.',
    detail,
    options,
  )
}
