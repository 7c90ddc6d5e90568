// Oracles: closed forms named at each test; Dattorro 1997 (FACTS 2a, verified there) for THD+N; the phrase itself for the material's spectrum.
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { cheapestChange, cheapestSetting, choiceOf, settingCost, settingOf } from '../../src/analysis/artefactBench.ts'
import { interpolatorPower, tonesOf, updatesPower } from '../../src/analysis/artefactEstimate.ts'
import { artefactNoise, noisePower } from '../../src/analysis/artefactNoise.ts'
import { sweepMovement } from '../../src/analysis/artefactPlaces.ts'
import { artefactSteps, artefacts } from '../../src/analysis/artefacts.ts'
import { phrase } from '../../src/material/phrases.ts'
import type { Interpolation } from '../../src/set/types.ts'
import { realFft } from '../../src/signal/fft.ts'
import { rms } from '../../src/signal/levels.ts'
import { benchOf, drain, levels, oneVoice, tone } from './artefactTools.ts'

const everySample = { every: 1, between: 'ramp' } as const
const alone = (kind: Interpolation) => ({ voices: kind, loop: kind, updates: everySample })

describe('the material', () => {
  it('has the octaves of the built-in plucked chords from 125 Hz on, within 2.5 dB', () => {
    const octaves = (power: (hz: number) => number, step: number) =>
      [125, 250, 500, 1000, 2000, 4000, 8000].map((centre) => {
        let sum = 0
        for (let hz = centre / Math.SQRT2; hz < centre * Math.SQRT2; hz += step) sum += power(hz)
        return 10 * Math.log10(sum)
      })
    const chords = phrase('pluckedChords', 48000)
    const { re, im } = realFft(chords)
    const size = 2 * (re.length - 1)
    const ofChords = octaves((hz) => {
      const k = Math.round((hz * size) / 48000)
      return (re[k] as number) ** 2 + (im[k] as number) ** 2
    }, 48000 / size)
    const ofNoise = octaves(noisePower, 48000 / size)
    const shift = ofChords.reduce((sum, db, i) => sum + db - (ofNoise[i] as number), 0) / ofChords.length
    for (const [i, db] of ofChords.entries()) expect(Math.abs(db - shift - (ofNoise[i] as number))).toBeLessThan(2.5)
  })

  it('is of rms 1, and the same every time', () => {
    expect(rms(artefactNoise(44100))).toBeCloseTo(1, 12)
    const once = Float64Array.from(artefactNoise(44100))
    artefactNoise(48000)
    expect(artefactNoise(44100)).toEqual(once)
  })
})

describe('published figures', () => {
  // Dattorro 1997 (FACTS 2a, V): THD+N of a 400 Hz sine at 44.1 kHz, sweep 0.1 Hz: linear −78 to −88 dB, warped all-pass −77 to −85 dB. His depth is his
  // white chorus's, 350 samples; bin 149 of 16384 is 401 Hz. Ours takes nothing out but the tone, so the loud end of his range is what to expect.
  const bench = benchOf(
    oneVoice((set) => {
      set.sampleRate = 44100
      set.line.baseMs = 400000 / 44100
      set.sweep.depthMs = 350000 / 44100
      set.sweep.rateHz = 0.1
    }),
    tone(149),
  )

  it('a linear read of 400 Hz has Dattorro’s THD+N', () => {
    const { cycleDb } = levels(bench, alone('linear'))
    expect(cycleDb).toBeGreaterThan(-88)
    expect(cycleDb).toBeLessThan(-77)
    // Closed form: |A| = 1 − ω²/2 f(1 − f) for small ω, whose f(1 − f) has the variance 1/30 − 1/36.
    const omega = (2 * Math.PI * 149) / 16384
    expect(Math.abs(cycleDb - 20 * Math.log10((omega ** 2 / 2) * Math.sqrt(1 / 30 - 1 / 36)))).toBeLessThan(1)
  })

  it('an all-pass read of 400 Hz has at most that of Dattorro’s warped all-pass', () => {
    expect(levels(bench, alone('allpass1')).cycleDb).toBeLessThan(-77)
  })
})

describe('the measurement', () => {
  const set = oneVoice()
  const bench = benchOf(set)

  it('a read of whole samples that stand leaves nothing, and one at half a sample no more than stands still', () => {
    const standing = (samples: number) =>
      levels(
        benchOf(
          oneVoice((still) => {
            still.sweep.depthMs = 0
            still.line.baseMs = samples / 48
          }),
        ),
        alone('linear'),
      )
    expect(standing(240).db).toBeLessThan(-125)
    const half = standing(240.5)
    expect(half.standingDb).toBeGreaterThan(-60)
    expect(half.db).toBeLessThan(-90)
  })

  it.each(['nearest', 'linear', 'hermite4', 'lagrange3', 'allpass1'] as const)(
    '%s leaves the variance of its gain over all fractions, by formula',
    (kind) => {
      const expected = 10 * Math.log10(interpolatorPower(kind, tonesOf(bench)).voices)
      expect(Math.abs(levels(bench, alone(kind)).cycleDb - expected)).toBeLessThan(1)
    },
  )

  it.each([
    ['hold', 4],
    ['hold', 64],
    ['ramp', 16],
    ['ramp', 64],
  ] as const)('%s for %i samples leaves δ̄² · Σω²S by formula', (between, every) => {
    const updates = { every, between }
    const expected = 10 * Math.log10(drain(updatesPower(bench.stage, tonesOf(bench), updates)).voices)
    expect(Math.abs(levels(bench, { voices: 'reference', loop: 'reference', updates }).db - expected)).toBeLessThan(1)
  })

  it('the held delay misses by a sawtooth of K · slope: K²slope²/12, at the steepest place', () => {
    // 48 samples once a second: slope 2π · 48/48000; the stretch is short against the cycle.
    const slope = (2 * Math.PI * 48) / 48000
    const squares = tonesOf(bench).reduce((sum, { omega, voices }) => sum + omega ** 2 * voices, 0)
    const expected = 10 * Math.log10(((16 * slope) ** 2 / 12) * squares)
    const updates = { every: 16, between: 'hold' } as const
    expect(Math.abs(levels(bench, { voices: 'reference', loop: 'reference', updates }).steepestDb - expected)).toBeLessThan(1)
  })

  it('longer intervals of a smooth sweep never leave less', () => {
    for (const between of ['hold', 'ramp'] as const) {
      const found = [2, 4, 8, 16, 32, 64].map(
        (every) => levels(bench, { voices: 'reference', loop: 'reference', updates: { every, between } }).db,
      )
      expect(found).toEqual([...found].sort((a, b) => a - b))
    }
  })

  it('octaves go up to the noise’s end, and grow by 12 dB an octave for linear, 24 dB for lagrange3', () => {
    const steps = (kind: Interpolation) => {
      const { bands } = levels(bench, alone(kind))
      expect(bands.map(({ centreHz }) => centreHz)).toEqual([62.5, 125, 250, 500, 1000, 2000, 4000, 8000, 16000])
      const at = (hz: number) => bands.find(({ centreHz }) => centreHz === hz)?.db ?? Number.NaN
      return at(4000) - at(2000)
    }
    expect(Math.abs(steps('linear') - 12)).toBeLessThan(1.5)
    expect(Math.abs(steps('lagrange3') - 24)).toBeLessThan(3)
  })

  it('wet filters count: treble that is cut has no artefacts to hear', () => {
    const dull = oneVoice((changed) => {
      changed.mix.wetHighCutHz = 500
    })
    expect(levels(benchOf(dull), alone('linear')).db).toBeLessThan(levels(bench, alone('linear')).db - 10)
  })
})

describe('who is to blame', () => {
  it('the interpolator, the updates, or the loop', () => {
    expect(artefacts(oneVoice((set) => void Object.assign(set.sweep, { updateEvery: 16 }))).blame).toBe('voices')
    const held = artefacts(oneVoice((set) => void Object.assign(set.sweep, { updateEvery: 32, between: 'hold' })))
    expect(held.blame).toBe('updates')
    expect(held.own?.db).toBeGreaterThan(held.interpolators?.db ?? 0)
    const looped = artefacts(
      oneVoice((set) => {
        set.loop.feedback = 0.9
        set.loop.interpolation = 'linear'
      }),
    )
    expect(looped.blame).toBe('loop')
    // a²/(1 − a²) of g = 0.9 without filters is 4.26, 6.3 dB more than a linear read of the voices.
    const linear = artefacts(oneVoice((set) => void Object.assign(set.line, { interpolation: 'linear' }))).own?.db ?? 0
    expect((looped.own?.loopDb ?? 0) - linear).toBeCloseTo(10 * Math.log10(0.81 / 0.19), 0)
  })

  it('a loop at a fixed delay adds nothing', () => {
    const fixed = artefacts(oneVoice((set) => void Object.assign(set.loop, { feedback: 0.9, delay: 'fixed' })))
    expect(fixed.own?.loopDb).toBeNull()
  })
})

describe('the cheapest setting', () => {
  it('is the one that trying all of them finds', () => {
    const set = oneVoice((changed) => void Object.assign(changed.sweep, { updateEvery: 64, between: 'hold' }))
    const bench = benchOf(set)
    const found = drain(cheapestSetting(bench, -50))
    const kinds: readonly Interpolation[] = ['nearest', 'linear', 'hermite4', 'lagrange3', 'allpass1']
    const all = kinds.flatMap((line) =>
      [1, 2, 4, 8, 16, 32, 64].flatMap((updateEvery) =>
        (['ramp', 'hold'] as const).map((between) => ({ ...settingOf(set), line, updateEvery, between })),
      ),
    )
    const good = all.filter((setting) => levels(bench, choiceOf(setting)).db <= -50)
    expect(found?.cost).toBe(Math.min(...good.map((setting) => settingCost(set, setting))))
    expect(found?.db).toBeLessThanOrEqual(-50)
  })

  it('is none where nothing gets there, and a single change names one field', () => {
    const bench = benchOf(oneVoice((changed) => void Object.assign(changed.sweep, { updateEvery: 64, between: 'hold' })))
    expect(drain(cheapestSetting(bench, -90))).toBeNull()
    const ramped = drain(cheapestChange(bench, 'sweep.between', -60))
    expect(ramped?.setting).toEqual({ ...settingOf(bench.stage.set), between: 'ramp' })
    expect(drain(cheapestChange(bench, 'line.interpolation', -60))).toBeNull()
  })

  it('weakens no word on the loop’s stability', () => {
    const set = oneVoice((changed) => void Object.assign(changed.loop, { feedback: 0.9, interpolation: 'linear', delay: 'moving' }))
    const found = drain(cheapestSetting(benchOf(set), -45))
    expect(found).not.toBeNull()
    expect(found?.setting.loop).toBe('linear')
  })
})

describe('sweeps of every kind', () => {
  it('that stand or only jump have nothing to measure', () => {
    const movement = (change: Parameters<typeof oneVoice>[0]) => sweepMovement(oneVoice(change))
    expect(movement((set) => void Object.assign(set.sweep, { rateHz: 0 }))).toBe('stands')
    expect(movement((set) => void Object.assign(set.sweep, { depthMs: 0 }))).toBe('stands')
    expect(movement((set) => void Object.assign(set.sweep, { law: 'ratio', depthOctaves: 0 }))).toBe('stands')
    expect(
      movement(
        (set) =>
          void Object.assign(set.sweep, {
            shape: 'drawn',
            points: [
              [0, 0.3],
              [0.5, 0.3],
            ],
          }),
      ),
    ).toBe('stands')
    expect(movement((set) => void Object.assign(set.sweep, { shape: 'square', edgeMs: 0 }))).toBe('jumps')
    expect(artefacts(oneVoice((set) => void Object.assign(set.sweep, { rateHz: 0 })))).toMatchObject({ movement: 'stands', own: null })
  })

  it('a ramp’s jump without an edge is no artefact: it leaves what the ramp without its jump leaves', () => {
    const ramp = (edgeMs: number) =>
      artefacts(oneVoice((set) => void Object.assign(set.sweep, { shape: 'rampUp', edgeMs, updateEvery: 16 }))).own?.cycleDb ?? 0
    expect(ramp(0)).toBeLessThan(-58)
    expect(Math.abs(ramp(0) - ramp(30))).toBeLessThan(6)
  })

  it('give finite figures, the same twice, from 8 to 192 kHz, drift, drawn, ratio, edges, long lines', () => {
    const shapes = ['sine', 'triangle', 'square', 'rampUp', 'rampDown', 'drift', 'drawn'] as const
    const any = fc.record({
      shape: fc.constantFrom(...shapes),
      law: fc.constantFrom('time' as const, 'ratio' as const),
      rateHz: fc.constantFrom(0.01, 0.3, 7, 100),
      sampleRate: fc.constantFrom(8000, 48000, 192000),
      line: fc.constantFrom<Interpolation>('nearest', 'linear', 'lagrange3', 'allpass1'),
      baseMs: fc.constantFrom(30, 2000),
      count: fc.constantFrom(1, 2),
      updateEvery: fc.constantFrom(1, 16, 64),
      between: fc.constantFrom('ramp' as const, 'hold' as const),
    })
    fc.assert(
      fc.property(any, ({ sampleRate, line, baseMs, count, ...sweep }) => {
        const set = oneVoice((changed) => {
          Object.assign(changed, { sampleRate })
          Object.assign(changed.sweep, sweep, {
            depthMs: 20,
            depthOctaves: 0.5,
            points: [
              [0.1, -1],
              [0.4, 0.7],
              [0.45, -0.2],
            ],
          })
          Object.assign(changed.line, { baseMs, interpolation: line })
          changed.voices.count = count
        })
        const found = drain(artefactSteps(set))
        const figures = [found.own?.db, found.interpolators?.db, found.updates?.db, ...(found.own?.bands.map(({ db }) => db) ?? [])]
        for (const figure of figures) expect(Number.isFinite(figure)).toBe(true)
        for (const { db } of found.own?.bands ?? []) expect(db).toBeLessThan(20)
        expect(artefacts(set)).toEqual(found)
      }),
      { numRuns: 4 },
    )
  })
})
