import { describe, expect, it } from 'vitest'
import { identifiedShare, partsOf } from './airtime.ts'

describe('partsOf', () => {
  it('splits held airtime into parts that add up to it', () => {
    expect(partsOf({ heldSeconds: 100, musicSeconds: 60, identifiedSeconds: 45 })).toEqual({
      identified: 45,
      unidentified: 15,
      other: 40,
    })
  })

  it('has no part below nothing where more is identified than was heard as music', () => {
    expect(partsOf({ heldSeconds: 100, musicSeconds: 40, identifiedSeconds: 45 })).toEqual({
      identified: 45,
      unidentified: 0,
      other: 55,
    })
  })
})

describe('identifiedShare', () => {
  it('is unknown without music and never more than the whole', () => {
    expect(identifiedShare({ heldSeconds: 100, musicSeconds: 0, identifiedSeconds: 0 })).toBeNull()
    expect(identifiedShare({ heldSeconds: 100, musicSeconds: 40, identifiedSeconds: 45 })).toBe(1)
  })
})
