const browsers = [
  { sign: /Edg\//, name: 'Edge' },
  { sign: /Firefox\//, name: 'Firefox' },
  { sign: /Chrome\//, name: 'Chrome' },
  { sign: /Safari\//, name: 'Safari' },
] as const

const systems = [
  { sign: /Android/, name: 'Android' },
  { sign: /iPhone|iPad/, name: 'iOS' },
  { sign: /Windows/, name: 'Windows' },
  { sign: /Mac OS X/, name: 'macOS' },
  { sign: /Linux/, name: 'Linux' },
] as const

/** A browser's signature in words a person recognises; the signature itself where nothing in it is known. */
export function describeUserAgent(userAgent: string): string {
  const browser = browsers.find(({ sign }) => sign.test(userAgent))?.name
  const system = systems.find(({ sign }) => sign.test(userAgent))?.name
  if (browser === undefined && system === undefined) return userAgent === '' ? 'Unknown program' : userAgent
  return [browser ?? 'Unknown browser', system].filter((part) => part !== undefined).join(' on ')
}
