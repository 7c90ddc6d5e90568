import { afterEach, describe, expect, it } from 'vitest'
import { rateRemark } from '../../../app/audio/lifeCycle.ts'
import { guardText } from '../../../app/audio/reports.ts'
import { levelGain, settingsNow } from '../../../app/audio/settings.ts'
import { TRIPPED_BY_LEVEL, TRIPPED_BY_NON_FINITE } from '../../../app/audio/worklet/guard.ts'
import { useSession } from '../../../app/state/session.ts'
import { useView } from '../../../app/state/view.ts'

const start = useSession.getState()
afterEach(() => {
  useSession.setState(start)
  useView.setState({ held: null })
})

const equalWith = (change: Partial<typeof start>) => {
  useSession.setState({ equalLoudness: true, equalDb: 4, ...change })
  const { equalDb, equalLive } = settingsNow()
  return [equalDb, equalLive]
}

describe('what the processor is told', () => {
  it('a level of 0 dB is a gain of 1, −20 dB a tenth, the lowest silence', () => {
    expect(levelGain(0)).toBe(1)
    expect(levelGain(-20)).toBeCloseTo(0.1, 12)
    expect(levelGain(-60)).toBe(0)
  })

  it('equal loudness applies where the effect is heard, and nowhere else', () => {
    expect(equalWith({})).toEqual([4, false])
    expect(equalWith({ bypass: 'wetOnly' })).toEqual([4, false])
    expect(equalWith({ bypass: 'hard' })).toEqual([0, false])
    expect(equalWith({ bypass: 'tails' })).toEqual([0, false])
    expect(equalWith({ bypass: 'off', equalLoudness: false })).toEqual([0, false])
    expect(equalWith({ equalDb: null })).toEqual([0, false])
  })

  it('live input measures itself, and is open only once headphones are confirmed', () => {
    const live = { kind: 'live', deviceId: 'x', label: 'X' } as const
    expect(equalWith({ source: live })).toEqual([0, true])
    expect(settingsNow().inputOpen).toBe(false)
    useSession.setState({ headphones: true })
    expect(settingsNow().inputOpen).toBe(true)
    useSession.setState({ source: { kind: 'phrase', id: 'noise' } })
    expect(settingsNow().inputOpen).toBe(false)
  })

  it('a held sweep position goes along', () => {
    useView.setState({ held: 0.25 })
    expect(settingsNow().held).toBe(0.25)
  })
})

describe('what the user is told', () => {
  it('of a rate that could not be had', () => {
    expect(rateRemark({ rate: 44_100, askedRate: 48_000 })).toBe('heard at 44.1 kHz, set at 48')
    expect(rateRemark({ rate: 48_000, askedRate: 48_000 })).toBe(null)
  })

  it('of the guard: why it muted, and what brings the sound back', () => {
    expect(guardText('recovers', TRIPPED_BY_LEVEL)).toContain('passed +12 dBFS')
    expect(guardText('recovers', TRIPPED_BY_NON_FINITE)).toContain('no longer a number')
    expect(guardText('latched', TRIPPED_BY_LEVEL)).toContain('Change the set')
  })
})
