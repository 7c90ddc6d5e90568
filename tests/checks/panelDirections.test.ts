// The directions and bounds that panel.box relies on, each tried on random sets: along one parameter, the others anywhere.
import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { sweepDetune } from '../../src/analysis/detune.ts'
import { gainBound } from '../../src/analysis/panelGainBound.ts'
import { listedSpans } from '../../src/analysis/panelKnobs.ts'
import { loopBounds, poleBound } from '../../src/analysis/panelLoopBounds.ts'
import type { Direction } from '../../src/analysis/panelOptions.ts'
import type { PanelFigure } from '../../src/analysis/panelSearch.ts'
import type { PanelBox } from '../../src/analysis/panelSpace.ts'
import { slopeBound } from '../../src/analysis/panelSweepBounds.ts'
import { sweptPole } from '../../src/analysis/polesSweep.ts'
import { stabilityWord } from '../../src/analysis/stability.ts'
import {
  closestRead,
  detuneOf,
  gainCover,
  longestRead,
  longestVoice,
  loopGainCover,
  loopGainOf,
  poleCover,
  slopeCover,
  unboundedOf,
} from '../../src/checks/panelDirections.ts'
import { defaultSet } from '../../src/set/defaults.ts'
import { moveValue } from '../../src/set/panel.ts'
import { isMovable } from '../../src/set/panelProblems.ts'
import type { NumberParameter } from '../../src/set/parameters/kinds.ts'
import { PARAMETERS, type Parameter, parameter } from '../../src/set/parameters.ts'
import { getAt, withAt } from '../../src/set/path.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { createRandom } from '../../src/signal/random.ts'
import { randomSet } from '../dsp/sets.ts'
import { move } from './panelSets.ts'

/** The box of one set in which only `path` has a range. */
const boxOf = (set: ParameterSet, path: string, ends: readonly [number, number]): PanelBox => ({
  set,
  spans: [],
  range: (other) => {
    if (other === path) return ends
    const value = getAt(set, other)
    return typeof value === 'number' ? [value, value] : [0, 0]
  },
})

const FIGURES: Readonly<Record<string, PanelFigure>> = {
  closestRead,
  longestRead,
  longestVoice,
  'detune, rising': detuneOf('rise'),
  'detune, falling': detuneOf('fall'),
  slopeCover,
  'loop gain, rising': loopGainOf('rise'),
  'loop gain, falling': loopGainOf('fall'),
  loopGainCover,
  unbounded: unboundedOf,
  poleCover,
  'gain at the output': gainCover('peak'),
  'gain in the line': gainCover('line'),
}

function follows(direction: Direction, values: readonly number[]): boolean {
  const slack = (value: number) => (Number.isFinite(value) ? 1e-7 * Math.max(1e-3, Math.abs(value)) : 0)
  const ends = Math.max(values[0] as number, values.at(-1) as number)
  switch (direction) {
    case 'rises':
      return values.every((value, i) => i === 0 || value >= (values[i - 1] as number) - slack(value))
    case 'falls':
      return values.every((value, i) => i === 0 || value <= (values[i - 1] as number) + slack(value))
    case 'ends':
      return values.every((value) => value <= ends + slack(ends))
    case 'any':
      return true
  }
}

/** Sets as effects have them: anySet's are mostly at the ends of what numbers can be. */
const anySet = fc.nat().map(randomSet)

describe('directions', () => {
  it.each(Object.keys(FIGURES))(
    '%s moves as the table says',
    (name) => {
      const figure = FIGURES[name] as PanelFigure
      // A side of the loop's chord is the larger of both: only shapes whose sides are alike tell one from the other.
      const alike = (set: ParameterSet) =>
        !name.startsWith('loop gain') || ['sine', 'triangle', 'square', 'drift'].includes(set.sweep.shape)
      fc.assert(
        fc.property(anySet, fc.nat(), (set, seed) => {
          if (!alike(set)) return
          const next = createRandom(seed)
          const loud = withAt(set, 'loop.feedback', set.loop.feedback / 2)
          for (const path of Object.keys(figure.directions(boxOf(loud, '', [0, 0])))) {
            const row = parameter(path)
            if ((row.kind !== 'number' && row.kind !== 'integer') || typeof getAt(loud, path) !== 'number') continue
            const { min, max } = row as NumberParameter
            const draw = () =>
              next() < 0.5 ? min + (max - min) * next() : Math.max(min, Math.min(max, (getAt(loud, path) as number) * (0.5 + next())))
            const values = [draw(), draw(), draw(), draw()].map((x) => (row.kind === 'integer' ? Math.round(x) : x)).sort((a, b) => a - b)
            const direction = figure.directions(boxOf(loud, path, [values[0] as number, values.at(-1) as number]))[path]
            if (direction === undefined) continue
            const figures = values.map((value) => figure.worse(withAt(loud, path, value), loud.sampleRate))
            expect(follows(direction, figures), `${path} ${direction}: ${values.join(' ')} gives ${figures.join(' ')}`).toBe(true)
          }
        }),
        { numRuns: 60 },
      )
    },
    60_000,
  )
})

describe('what is left out', () => {
  it.each(Object.keys(FIGURES))(
    'does not concern %s',
    (name) => {
      const figure = FIGURES[name] as PanelFigure
      fc.assert(
        fc.property(anySet, fc.nat(), (drawn, seed) => {
          const next = createRandom(seed)
          const set = withAt(drawn, 'loop.feedback', drawn.loop.feedback / 2)
          for (const row of PARAMETERS.filter(isMovable)) {
            const { path } = row
            const now = getAt(set, path)
            if (figure.listed.includes(path) || now === undefined || now === null) continue
            const value = otherValue(row, next)
            const ends = [now, value].map(Number).sort((a, b) => a - b) as [number, number]
            const numeric = row.kind === 'number' || (row.kind === 'integer' && !row.values)
            if (numeric && figure.directions(boxOf(set, path, ends))[path] !== undefined) continue
            const changed = figure.worse(withAt(set, path, value), set.sampleRate)
            const same = figure.worse(set, set.sampleRate)
            const close = changed === same || Math.abs(changed - same) <= 1e-6 * Math.max(1, Math.abs(same))
            expect(close, `${path} from ${now} to ${value}: ${same} became ${changed}`).toBe(true)
          }
        }),
        { numRuns: 25 },
      )
    },
    60_000,
  )
})

function otherValue(row: Parameter, next: () => number): unknown {
  if (row.kind === 'choice') return row.options[Math.floor(next() * row.options.length)]?.value
  if (row.kind === 'boolean') return next() < 0.5
  const { min, max, values } = row as NumberParameter
  if (values) return values[Math.floor(next() * values.length)]
  return row.kind === 'integer' ? Math.round(min + (max - min) * next()) : min + (max - min) * next()
}

describe('bounds', () => {
  it('no pole of the sweep lies outside the bound, and no word is weaker than the gains say', () => {
    fc.assert(
      fc.property(anySet, (drawn) => {
        const set = withAt(
          { ...drawn, line: { ...drawn.line, baseMs: Math.min(40, drawn.line.baseMs) } },
          'loop.feedback',
          drawn.loop.feedback / 2,
        )
        const { sampleRate } = set
        const bound = poleBound(set, sampleRate)
        const pole = sweptPole(set, sampleRate)
        if (pole !== null && bound !== null) expect(pole.lnRadius).toBeLessThanOrEqual(bound + 1e-12)
        const { certified, gain, moves } = loopBounds(set, sampleRate)
        const { word, certified: known, frozenGain } = stabilityWord(set, sampleRate)
        expect(frozenGain).toBeLessThanOrEqual(gain * (1 + 1e-9) + 1e-12)
        if (certified < 1) expect(word).toBe('proven')
        if (certified < 1 && known) expect(known.value).toBeLessThanOrEqual(certified * (1 + 1e-9))
        if (gain < 1 && !moves) expect(word).toBe('proven')
      }),
      { numRuns: 60 },
    )
  }, 60_000)

  it('no chord of the sweep is steeper than its steepest place', () => {
    fc.assert(
      fc.property(anySet, (set) => {
        const { maxSlope, minSlope } = sweepDetune(set)
        const bound = slopeBound(set, set.sampleRate, true)
        expect(Math.max(maxSlope, -minSlope)).toBeLessThanOrEqual(bound * (1 + 1e-9) + 1e-12)
      }),
      { numRuns: 300 },
    )
  })

  // One voice, dry and wet in phase at 0 Hz, g > 0: (dry + wet/(1 − g)), and 1/(1 − g) in the line.
  it('the gain bound is the gain itself where all comes together at 0 Hz', () => {
    const set = withAt(withAt(withAt(withAt(defaultSet(), 'loop.feedback', 0.5), 'mix.dry', 0.5), 'mix.wet', 0.25), 'voices.count', 1)
    expect(gainBound(set, 48000, 'peak')).toBeCloseTo(20 * Math.log10(0.5 + 0.25 / 0.5), 9)
    expect(gainBound(set, 48000, 'line')).toBeCloseTo(20 * Math.log10(2), 9)
  })
})

describe('choices on a knob', () => {
  it('each value keeps its own stretch of the turn, and nothing is left out', () => {
    const points = [
      [0, 0.1],
      [0.4, 1],
      [1, 0],
    ] as const
    for (const own of [
      move('sweep.shape', 'sine', 'rampDown'),
      move('sweep.updateEvery', 64, 1),
      move('mix.invertRight', false, true),
      move('line.interpolation', 'nearest', 'allpass1', { taper: 'drawn', points }),
    ]) {
      const spans = listedSpans(own)
      for (const { from, to } of spans) {
        const values = [from, (from + to) / 2, to].map((position) => moveValue(own, position))
        expect(new Set(values).size, `${from} to ${to}`).toBe(1)
      }
      for (let i = 0; i <= 1000; i++) expect(spans.some(({ from, to }) => from - 2e-9 <= i / 1000 && i / 1000 <= to + 2e-9)).toBe(true)
    }
    expect(listedSpans(move('mix.invertRight', false, true)).map(({ from }) => from)).toEqual([0, 0.5])
  })
})
