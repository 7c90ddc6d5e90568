import { describe, expect, it } from 'vitest'
import { type Audition, createAudition, receive, render, takeUnused } from '../../../../app/audio/worklet/audition.ts'
import { GUARD_LIMIT, GUARD_OPEN } from '../../../../app/audio/worklet/guard.ts'
import { REPORT, SCOPE_FRAMES } from '../../../../app/audio/worklet/messages.ts'
import { renderSet } from '../../../../src/dsp/render.ts'
import { defaultSet } from '../../../../src/set/defaults.ts'
import { flatten } from '../../../../src/set/flat.ts'
import { withAt } from '../../../../src/set/path.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { LISTENER } from './listener.ts'

const FS = 48_000

const withFields = (fields: Readonly<Record<string, unknown>>): ParameterSet =>
  Object.entries(fields).reduce((set, [path, value]) => withAt(set, path, value), defaultSet())

const noise = (frames: number, peak = 0.25): Float32Array => {
  let seed = 11
  return Float32Array.from({ length: frames }, () => {
    seed = (Math.imul(seed, 1664525) + 1013904223) | 0
    return (peak * seed) / 2 ** 31
  })
}

const sampleOf = (channels: readonly Float32Array[], id = 1) =>
  ({ type: 'source', source: { type: 'sample', id, channels, circular: false, start: 0, end: channels[0]?.length ?? 0 } }) as const

/** Runs whole quanta and gathers the output; calls `each` after every quantum. */
function run(audition: Audition, seconds: number, { quantum = 128, input = [], each = () => {} }: RunOptions = {}) {
  const frames = Math.floor((seconds * FS) / quantum) * quantum
  const left = new Float32Array(frames)
  const right = new Float32Array(frames)
  for (let at = 0; at < frames; at += quantum) {
    const out = [new Float32Array(quantum), new Float32Array(quantum)] as const
    const due = render(audition, input, out, at)
    left.set(out[0], at)
    right.set(out[1], at)
    each(at, due)
  }
  return { left, right }
}

interface RunOptions {
  readonly quantum?: number
  readonly input?: readonly Float32Array[]
  readonly each?: (frame: number, due: boolean) => void
}

const peakOf = (samples: Float32Array) => samples.reduce((peak, x) => Math.max(peak, Math.abs(x)), 0)

describe('what is heard', () => {
  it('is what render gives for the same sound, to single precision', () => {
    const set = withFields({ 'loop.feedback': 0.4, 'loop.dampingHz': 4000 })
    const audition = createAudition(set, FS, LISTENER)
    // The fades from silence and into playing are taken out of the way, so that the sound begins with its first frame.
    const sound = noise(FS)
    receive(audition, sampleOf([sound]))
    audition.player.fadeLeft = 0
    audition.listening.play.left = 0
    audition.listening.play.value = 1
    const { left, right } = run(audition, 0.9)
    const [wanted, wantedRight] = renderSet(set, [Float64Array.from(sound)]) as [Float64Array, Float64Array | undefined]
    // One rounding to single precision of values under 1.
    for (let n = 0; n < left.length; n++) {
      expect(Math.abs((left[n] as number) - (wanted[n] as number))).toBeLessThan(6e-8)
      expect(Math.abs((right[n] as number) - ((wantedRight ?? wanted)[n] as number))).toBeLessThan(6e-8)
    }
  })

  it.each([64, 256, 192, 1000])('does not depend on the quantum: %i frames give what 128 give', (quantum) => {
    const make = () => {
      const audition = createAudition(withFields({ 'loop.feedback': 0.5 }), FS, LISTENER)
      receive(audition, sampleOf([noise(20_000)]))
      return audition
    }
    const frames = Math.floor((FS * 0.5) / quantum) * quantum
    const expected = run(make(), 0.6).left.subarray(0, frames)
    expect(run(make(), 0.5, { quantum }).left.subarray(0, frames)).toEqual(expected)
  })

  it('starts silent and rises within 0.4 s of the first Play: no step above one sample of the fade', () => {
    const audition = createAudition(withFields({ 'mix.wet': 0, 'mix.dry': 1 }), FS, { ...LISTENER, playing: false })
    receive(audition, sampleOf([new Float32Array(FS).fill(0.5)]))
    expect(peakOf(run(audition, 0.1).left)).toBe(0)
    receive(audition, { type: 'settings', settings: LISTENER })
    const { left } = run(audition, 0.5)
    const steps = left.slice(1).map((x, n) => Math.abs(x - (left[n] as number)))
    expect(left[0]).toBeLessThan(1e-3)
    expect(peakOf(steps)).toBeLessThan(0.5 / (0.02 * FS))
    expect(left.at(-1)).toBeCloseTo(0.5, 6)
  })

  it('fades out within 40 ms of Pause, then stands: neither sweep nor sound moves on', () => {
    const audition = createAudition(defaultSet(), FS, LISTENER)
    receive(audition, sampleOf([noise(FS)]))
    run(audition, 0.5)
    receive(audition, { type: 'settings', settings: { ...LISTENER, playing: false } })
    const { left } = run(audition, 0.2)
    expect(peakOf(left.subarray(Math.round(0.045 * FS)))).toBe(0)
    const { frame } = audition.player.now
    run(audition, 0.2)
    expect(audition.player.now.frame).toBe(frame)
  })

  it('mutes within 20 ms and goes on underneath', () => {
    const audition = createAudition(defaultSet(), FS, LISTENER)
    receive(audition, sampleOf([noise(FS)]))
    run(audition, 0.5)
    receive(audition, { type: 'settings', settings: { ...LISTENER, muted: true } })
    const { left } = run(audition, 0.2)
    expect(peakOf(left.subarray(Math.round(0.021 * FS)))).toBe(0)
    expect(audition.meters.peaks[2]).toBeGreaterThan(0)
  })

  it('never exceeds +6 dB of the listening level nor full scale, whatever the effect gives', () => {
    const audition = createAudition(withFields({ 'mix.outputGainDb': 22, 'mix.wet': 0, 'mix.dry': 1 }), FS, { ...LISTENER, level: 0.1 })
    receive(audition, sampleOf([new Float32Array(FS).fill(0.25)]))
    // 0.25 at +22 dB is 3.15: under the guard's limit, over the cap.
    expect(peakOf(run(audition, 0.9).left)).toBeCloseTo(0.2, 6)
    receive(audition, { type: 'settings', settings: { ...LISTENER, level: 1 } })
    expect(peakOf(run(audition, 0.9).left)).toBe(1)
  })

  it('adds equal loudness to the effect, 12 dB at most', () => {
    const audition = createAudition(withFields({ 'mix.wet': 0, 'mix.dry': 0.1 }), FS, { ...LISTENER, equalDb: 6 })
    receive(audition, sampleOf([new Float32Array(FS).fill(0.5)]))
    expect(run(audition, 0.9).left.at(-1)).toBeCloseTo(0.05 * 10 ** (6 / 20), 6)
    receive(audition, { type: 'settings', settings: { ...LISTENER, equalDb: 40 } })
    expect(run(audition, 0.9).left.at(-1)).toBeCloseTo(0.05 * 10 ** (12 / 20), 6)
  })

  it('brings live input to equal loudness within 3 s: half the level is raised by 6 dB', () => {
    const audition = createAudition(withFields({ 'mix.wet': 0, 'mix.dry': 0.5 }), FS, { ...LISTENER, equalLive: true, inputOpen: true })
    receive(audition, { type: 'source', source: { type: 'input' } })
    const input = [Float32Array.from({ length: 128 }, (_, n) => 0.2 * Math.sin((2 * Math.PI * n) / 32))]
    run(audition, 4, { input })
    // Oracle: 20 log10 2 = 6.02 dB; the gain moves in steps of half a decibel at least.
    expect(Math.abs(audition.liveLoudness.gainDb - 20 * Math.log10(2))).toBeLessThan(0.5)
  })
})

describe('a loop that runs away', () => {
  const runaway = withFields({ 'line.baseMs': 10, 'sweep.depthMs': 2, 'loop.feedback': 1.3, 'loop.interpolation': 'linear' })

  it('is muted within 50 ms of passing the limit, says so, and sounds again once the set is safe', () => {
    const audition = createAudition(runaway, FS, LISTENER)
    receive(audition, sampleOf([noise(FS)]))
    const quantum = 128
    let passedAt = -1
    let silentAt = -1
    run(audition, 2, {
      quantum,
      each: (frame) => {
        if (passedAt < 0 && audition.guard.trips > 0) passedAt = frame
        if (passedAt >= 0 && silentAt < 0 && audition.guard.gain.value === 0) silentAt = frame + quantum
      },
    })
    expect(passedAt).toBeGreaterThan(0)
    expect((silentAt - passedAt) / FS).toBeLessThan(0.05)
    expect(audition.report[REPORT.guardState]).not.toBe(GUARD_OPEN)
    expect(audition.report[REPORT.guardPeak]).toBeGreaterThan(GUARD_LIMIT)

    receive(audition, { type: 'set', flat: flatten(withAt(runaway, 'loop.feedback', 0.3)) })
    expect(peakOf(run(audition, 3).left)).toBeGreaterThan(0.1)
    expect(audition.guard.state).toBe(GUARD_OPEN)
  })

  it('keeps everything heard at or under full scale and finite, set by set', () => {
    const audition = createAudition(runaway, FS, LISTENER)
    receive(audition, sampleOf([noise(FS)]))
    for (let g = -2; g <= 2; g += 0.5) {
      receive(audition, { type: 'set', flat: flatten(withAt(runaway, 'loop.feedback', g)) })
      const { left, right } = run(audition, 1)
      expect(left.every((x) => Math.abs(x) <= 1) && right.every((x) => Math.abs(x) <= 1)).toBe(true)
    }
  })
})

describe('messages', () => {
  it('the last set within a quantum wins, and a set of the wrong length is left alone', () => {
    const audition = createAudition(withFields({ 'mix.wet': 0, 'mix.dry': 1 }), FS, LISTENER)
    receive(audition, sampleOf([new Float32Array(FS).fill(0.5)]))
    receive(audition, { type: 'set', flat: flatten(withFields({ 'mix.wet': 0, 'mix.dry': 0.2 })) })
    receive(audition, { type: 'set', flat: flatten(withFields({ 'mix.wet': 0, 'mix.dry': 0.6 })) })
    receive(audition, { type: 'set', flat: new Float64Array(3) })
    expect(run(audition, 0.9).left.at(-1)).toBeCloseTo(0.3, 6)
  })

  it('gives back each sample memory once, when the next has taken over', () => {
    const audition = createAudition(defaultSet(), FS, LISTENER)
    receive(audition, sampleOf([noise(1000)], 1))
    receive(audition, sampleOf([noise(1000)], 2))
    receive(audition, sampleOf([noise(1000)], 3))
    expect(takeUnused(audition)?.id).toBe(1)
    run(audition, 0.1)
    expect(takeUnused(audition)?.id).toBe(2)
    expect(takeUnused(audition)).toBe(null)
  })

  it('a region of a memory that no longer plays changes nothing', () => {
    const audition = createAudition(defaultSet(), FS, LISTENER)
    receive(audition, sampleOf([noise(FS)], 2))
    receive(audition, { type: 'region', id: 1, start: 100, end: 200 })
    expect([audition.player.start, audition.player.end]).toEqual([0, FS])
    receive(audition, { type: 'region', id: 2, start: 100, end: 20_000 })
    expect([audition.player.start, audition.player.end]).toEqual([100, 20_000])
  })
})

describe('reports', () => {
  it('come every 32 ms while it runs, once more when it stops, and then no more', () => {
    const audition = createAudition(defaultSet(), FS, LISTENER)
    let reports = 0
    const count = (_frame: number, due: boolean) => {
      if (due) reports++
    }
    run(audition, 3.2, { each: count })
    expect(Math.abs(reports - 100)).toBeLessThanOrEqual(1)
    reports = 0
    receive(audition, { type: 'settings', settings: { ...LISTENER, playing: false } })
    run(audition, 1, { each: count })
    expect(reports).toBeLessThanOrEqual(3)
    expect(audition.report[REPORT.running]).toBe(0)
    expect(Array.from(audition.report.slice(REPORT.peaks, REPORT.peaks + 4))).toEqual([0, 0, 0, 0])
  })

  it('carry the sweep position of their frame and how it moves', () => {
    const set = withFields({ 'sweep.rateHz': 2, 'sweep.startPhase': 0.25 })
    const audition = createAudition(set, FS, LISTENER)
    run(audition, 0.6)
    const { report } = audition
    const wanted = 0.25 + ((report[REPORT.frame] as number) * 2) / FS
    expect(report[REPORT.position]).toBeCloseTo(wanted - Math.floor(wanted), 9)
    expect(report[REPORT.positionStep]).toBe(2 / FS)
    receive(audition, { type: 'settings', settings: { ...LISTENER, held: 0.75 } })
    run(audition, 0.2)
    expect([report[REPORT.position], report[REPORT.positionStep]]).toEqual([0.75, 0])
  })

  it('carry input and output of the same frames: a bare dry path shows the same window twice', () => {
    const audition = createAudition(withFields({ 'mix.wet': 0, 'mix.dry': 1 }), FS, LISTENER)
    receive(audition, sampleOf([noise(FS)]))
    run(audition, 0.3)
    const scopeIn = audition.report.slice(REPORT.scope, REPORT.scope + SCOPE_FRAMES)
    const scopeOut = audition.report.slice(REPORT.scope + SCOPE_FRAMES)
    expect(Math.max(...scopeIn)).toBeGreaterThan(0.1)
    expect(scopeOut).toEqual(scopeIn)
  })

  it('count output samples beyond full scale', () => {
    const audition = createAudition(withFields({ 'mix.wet': 0, 'mix.dry': 4 }), FS, LISTENER)
    receive(audition, sampleOf([new Float32Array(FS).fill(0.2)]))
    run(audition, 0.3)
    expect(audition.report[REPORT.overs]).toBe(0)
    receive(audition, sampleOf([new Float32Array(FS).fill(0.5)], 2))
    run(audition, 0.3)
    expect(audition.report[REPORT.overs]).toBeGreaterThan(0.2 * FS)
  })
})
