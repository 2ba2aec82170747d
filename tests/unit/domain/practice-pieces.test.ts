import { describe, expect, it } from 'vitest'
import { courseFit } from '#shared/domain/running-bond'
import { readLevel } from '#shared/domain/spirit-level'

const fit = (offset: number, leastOverlap = 8) => courseFit({ offset, blockLength: 48, tieSpacing: 8, leastOverlap })

describe('how a course lies on the one below', () => {
  it('is a continuous joint at no shift and at a whole block', () => {
    for (const offset of [0, 48, -48, 96]) expect(fit(offset)).toMatchObject({ overlap: 0, isStacked: true, isEnough: false })
  })
  it('counts the overlap to the nearer joint', () => {
    expect(fit(24).overlap).toBe(24)
    expect(fit(40).overlap).toBe(8)
    expect(fit(-8).overlap).toBe(8)
  })
  it('is enough from the least overlap on, that included', () => {
    expect(fit(7).isEnough).toBe(false)
    expect(fit(8).isEnough).toBe(true)
    expect(fit(41).isEnough).toBe(false)
    expect(courseFit({ offset: 0, blockLength: 48, tieSpacing: 8, leastOverlap: 0 }).isEnough).toBe(false)
  })
  it('has its ties in line only at whole tie spacings', () => {
    expect(fit(16).areTiesInLine).toBe(true)
    expect(fit(20).areTiesInLine).toBe(false)
  })
})

describe('the bubble of a level', () => {
  it('runs to the high end and stops at the glass', () => {
    expect(readLevel(0)).toEqual({ bubble: 0, reading: 'level' })
    expect(readLevel(2)).toMatchObject({ reading: 'rightHigh' })
    expect(readLevel(-2)).toMatchObject({ reading: 'leftHigh' })
    expect(readLevel(90).bubble).toBe(1.5)
  })
})
