import fc from 'fast-check'
import { describe, expect, it } from 'vitest'
import { defaultSet, defaultShaper } from '../../src/set/defaults.ts'
import { parseSet } from '../../src/set/parse.ts'
import { withAt } from '../../src/set/path.ts'
import { readSet } from '../../src/set/read.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { writeSet } from '../../src/set/write.ts'
import { anySet } from './anySet.ts'

const head = { format: 'combwright-set', version: 1 }
const problems = (json: unknown) => {
  const result = typeof json === 'string' ? readSet(json) : parseSet(json)
  if (result.ok) throw new Error('it was read')
  return result.problems
}
const messages = (json: unknown) => problems(json).map((p) => p.message)
const knob = (moves: unknown, rest = {}) => ({ ...head, panel: [{ knob: 'A', ...rest, moves }] })
const ok = (json: unknown): ParameterSet => {
  const result = parseSet(json)
  if (!result.ok) throw new Error(result.problems[0]?.message)
  return result.value
}

describe('reading a set file', () => {
  it('format and version alone read as the printed defaults', () => {
    expect(ok(head)).toEqual(defaultSet())
    // DESIGN 4, as printed there.
    expect(ok(head)).toMatchObject({
      name: 'Three slow voices',
      sampleRate: 48000,
      line: { baseMs: 12, interpolation: 'lagrange3' },
      sweep: {
        shape: 'sine',
        rateHz: 0.4,
        law: 'time',
        depthMs: 2.5,
        depthOctaves: 1,
        stereoPhase: 90,
        edgeMs: 30,
        seed: 1,
        updateEvery: 16,
      },
      voices: { count: 3, phaseSpread: 360, spreadMs: 4 },
      loop: { feedback: 0, delay: 'moving', interpolation: 'linear', dampingHz: null, lowCutHz: null, crossFeed: 0, shaper: null },
      mix: { dry: 0.7071, wet: 0.7071, dryTap: 'input', dryDelayMs: 0 },
      target: {
        part: 'cortex-m4',
        numberFormat: 'q15',
        ramBytes: 65536,
        clockHz: 96000000,
        blockSize: 32,
        headroomDb: 12,
        cyclesPerSample: null,
      },
    })
  })

  it('a shaper needs its curve and gets the rest', () => {
    expect(ok({ ...head, loop: { shaper: { curve: 'tanh', drive: 2 } } }).loop.shaper).toEqual({ ...defaultShaper('tanh'), drive: 2 })
    expect(messages({ ...head, loop: { shaper: { drive: 2 } } })[0]).toMatch(/^loop\.shaper\.curve is missing, and must be one of hardClip/)
  })

  it('a knob gets position, steps, smoothing and taper', () => {
    const { panel } = ok(knob([{ parameter: 'mix.wet', min: 0, max: 1 }]))
    expect(panel[0]).toEqual({
      knob: 'A',
      position: 0.5,
      steps: 128,
      smoothMs: 30,
      moves: [{ parameter: 'mix.wet', min: 0, max: 1, taper: 'linear', points: [] }],
    })
  })

  it('a byte-order mark is passed over', () => {
    expect(readSet(`\uFEFF${JSON.stringify(head)}`).ok).toBe(true)
  })

  it.each<[string, unknown, string]>([
    ['unknown key', { ...head, sweep: { rate: 1 } }, 'sweep.rate is an unknown key'],
    ['unknown key at the top', { ...head, rateHz: 1 }, 'rateHz is an unknown key'],
    ['wrong type', { ...head, sweep: { rateHz: '1' } }, 'sweep.rateHz must be 0 to 100 Hz, got "1"'],
    ['out of range', { ...head, loop: { feedback: 2.1 } }, 'loop.feedback must be -2 to 2, got 2.1'],
    ['null where it is not off', { ...head, mix: { dry: null } }, 'mix.dry must be -8 to 8, got null'],
    ['no whole number', { ...head, voices: { count: 2.5 } }, 'voices.count must be a whole number from 1 to 8, got 2.5'],
    ['not a listed value', { ...head, sweep: { updateEvery: 3 } }, 'sweep.updateEvery must be 1, 2, 4, 8, 16, 32, 64 samples, got 3'],
    [
      'unknown choice',
      { ...head, line: { interpolation: 'cubic' } },
      'line.interpolation must be one of nearest, linear, lagrange3, hermite4, allpass1, got "cubic"',
    ],
    ['a group that is no object', { ...head, line: 3 }, 'line must be an object, got 3'],
    ['a group that is null', { ...head, line: null }, 'line must be an object, got null'],
    ['a shaper that is no object', { ...head, mix: { shaper: 'tanh' } }, 'mix.shaper must be an object, or null, got "tanh"'],
    ['too long a name', { ...head, name: 'x'.repeat(121) }, `name must be text of at most 120 characters, got "${'x'.repeat(58)}…`],
    [
      'drawn without points',
      { ...head, sweep: { shape: 'drawn' } },
      'sweep.points must have 2 to 64 points when the curve is drawn, got 0',
    ],
    ['one point', { ...head, sweep: { points: [[0, 0]] } }, 'sweep.points must have 2 to 64 points when the curve is drawn, got 1'],
    [
      'points that fall back',
      {
        ...head,
        sweep: {
          points: [
            [0.5, 0],
            [0.5, 1],
          ],
        },
      },
      'sweep.points[1] must have a larger phase than the point before it, got [0.5,1]',
    ],
    [
      'a phase of 1',
      {
        ...head,
        sweep: {
          points: [
            [0, 0],
            [1, 1],
          ],
        },
      },
      'sweep.points[1] must be [phase, s] with phase from 0 to below 1 and s from -1 to 1, got [1,1]',
    ],
    [
      'a point of three',
      { ...head, sweep: { points: [[0, 0, 0]] } },
      'sweep.points[0] must be [phase, s] with phase from 0 to below 1 and s from -1 to 1, got [0,0,0]',
    ],
    ['a list for a group', { ...head, sweep: [] }, 'sweep must be an object, got []'],
    ['a list for a shaper', { ...head, loop: { shaper: [] } }, 'loop.shaper must be an object, or null, got []'],
    ['points that are none', { ...head, sweep: { points: 'x' } }, 'sweep.points must be a list of points, got "x"'],
    [
      'a shaper not from the origin',
      {
        ...head,
        loop: {
          shaper: {
            curve: 'drawn',
            points: [
              [0, 0.1],
              [1, 1],
            ],
          },
        },
      },
      'loop.shaper.points[0] must be [0, 0], got [0,0.1]',
    ],
    ['a limit of no check', { ...head, limits: { 'loop.margins': 1 } }, 'limits.loop.margins names no check'],
    ['a limit that is no number', { ...head, limits: { 'loop.ring': '3' } }, 'limits.loop.ring must be a finite number, got "3"'],
    ['too many knobs', { ...head, panel: Array(33).fill({ knob: 'A', moves: [] }) }, 'panel must be a list of at most 32 knobs, got 33'],
    ['a knob without moves', knob([]), 'panel[0].moves must be a list of 1 to 16 moves, got 0'],
    [
      'a knob of one step',
      knob([{ parameter: 'mix.wet', min: 0, max: 1 }], { steps: 1 }),
      'panel[0].steps must be a whole number from 0 to 1024 but not 1, got 1',
    ],
    [
      'a knob off its scale',
      knob([{ parameter: 'mix.wet', min: 0, max: 1 }], { position: 1.1 }),
      'panel[0].position must be 0 to 1, got 1.1',
    ],
    ['a move of nothing', knob([{ parameter: 'mix.wett', min: 0, max: 1 }]), 'panel[0].moves[0].parameter "mix.wett" is no parameter'],
    [
      'a move of the part',
      knob([{ parameter: 'target.part', min: 0, max: 1 }]),
      'panel[0].moves[0].parameter "target.part" is fixed when the unit is built and cannot be moved by a knob',
    ],
    ['an end out of range', knob([{ parameter: 'loop.feedback', min: 0, max: 3 }]), 'panel[0].moves[0].max must be -2 to 2, got 3'],
    [
      'an end that is off',
      knob([{ parameter: 'loop.dampingHz', min: null, max: 3 }]),
      'panel[0].moves[0].min must be a value of the parameter it moves, got null',
    ],
    [
      'an end that is no option',
      knob([{ parameter: 'sweep.shape', min: 'sine', max: 'saw' }]),
      'panel[0].moves[0].max must be one of sine, triangle, square, rampUp, rampDown, drift, drawn, got "saw"',
    ],
    [
      'log through zero',
      knob([{ parameter: 'loop.feedback', min: -0.5, max: 0.5, taper: 'log' }]),
      'panel[0].moves[0].taper "log" needs min and max both above or both below zero, got -0.5 and 0.5',
    ],
    [
      'log from zero',
      knob([{ parameter: 'mix.wet', min: 0, max: 1, taper: 'log' }]),
      'panel[0].moves[0].taper "log" needs min and max both above or both below zero, got 0 and 1',
    ],
    [
      'log of a choice',
      knob([{ parameter: 'sweep.shape', min: 'sine', max: 'square', taper: 'log' }]),
      'panel[0].moves[0].taper must be linear or drawn for sweep.shape, which has no ratios, got "log"',
    ],
    [
      'a drawn taper without points',
      knob([{ parameter: 'mix.wet', min: 0, max: 1, taper: 'drawn' }]),
      'panel[0].moves[0].points must have 2 to 64 points when the curve is drawn, got 0',
    ],
    [
      'two knobs for one field',
      { ...head, panel: ['A', 'B'].map((name) => ({ knob: name, moves: [{ parameter: 'mix.wet', min: 0, max: 1 }] })) },
      'panel[1].moves[0].parameter "mix.wet" is already moved by the knob "A"',
    ],
    [
      'a move of an absent shaper',
      knob([{ parameter: 'loop.shaper.drive', min: 1, max: 2 }]),
      'panel[0].moves[0].parameter "loop.shaper.drive" has no shaper to move: loop.shaper is null',
    ],
    ['another file', { format: 'something', version: 1 }, 'format must be "combwright-set", got "something"'],
    ['no object', [1], 'a set must be a JSON object, got [1]'],
    ['no version', { format: 'combwright-set' }, 'version must be 1, got nothing'],
    [
      'a version from the future',
      { format: 'combwright-set', version: 9, whatever: 1 },
      'version 9 is newer than this reader, which knows 1',
    ],
    ['a version of none', { format: 'combwright-set', version: 0 }, 'version must be 1, got 0'],
  ])('%s is refused with path, value and range', (_, json, message) => {
    expect(messages(json)[0]).toBe(message)
  })

  it('every refusal says it in lower case without a full stop or a word of English from elsewhere', () => {
    for (const text of messages({ ...head, a: 1, line: { baseMs: 'x' }, sweep: { points: 3 }, panel: {}, limits: [], loop: [] })) {
      expect(text).toMatch(/^[a-z][^\n]*[^.\n]$/)
      expect(text).not.toMatch(/invalid|expected/i)
    }
  })

  it('all problems come at once, each place once, in the order of the document', () => {
    const json = {
      ...head,
      loop: { feedback: 9, gain: 1 },
      line: { baseMs: -1 },
      sweep: { points: [[0, 0], ['a'], [0.5, 9]], rateHz: -1 },
      zzz: 0,
    }
    expect(problems(json).map((p) => p.path)).toEqual([
      'loop.feedback',
      'loop.gain',
      'line.baseMs',
      'sweep.points[1]',
      'sweep.rateHz',
      'zzz',
    ])
  })

  it('hints at the key that was meant', () => {
    expect(problems({ ...head, sweep: { rateHZ: 1 } })[0]?.hint).toBe('did you mean "rateHz"?')
    expect(problems({ ...head, feedback: 1 })[0]?.hint).toBe('did you mean "loop.feedback"?')
    expect(problems({ ...head, voices: { zzzz: 1 } })[0]?.hint).toBe('known keys here are count, phaseSpread, spreadMs')
  })

  it('keys of prototypes are unknown keys like others and change nothing', () => {
    const text = '{"format":"combwright-set","version":1,"__proto__":{"layout":"mono"},"sweep":{"constructor":1},"limits":{"__proto__":1}}'
    expect(problems(text).map((p) => p.path)).toEqual(['__proto__', 'sweep.constructor', 'limits.__proto__'])
    expect(({} as { layout?: string }).layout).toBeUndefined()
    expect(Object.getPrototypeOf(ok(head))).toBe(Object.prototype)
  })

  it('never throws, whatever JSON it is given', () => {
    fc.assert(
      fc.property(
        fc.jsonValue(),
        fc.jsonValue(),
        fc.constantFrom('sweep', 'panel', 'limits', 'loop', 'name', 'target'),
        (value, other, key) => {
          expect(parseSet(value).ok).toBe(false)
          const result = parseSet({ ...head, [key]: value, mix: other })
          if (!result.ok) expect(result.problems.length).toBeGreaterThan(0)
        },
      ),
      { numRuns: 500 },
    )
    for (const value of [undefined, () => 0, Symbol('x'), 1n, new Map(), Number.NaN])
      expect(parseSet({ ...head, name: value }).ok).toBe(value === undefined)
  })
})

describe('writing a set file', () => {
  it('any valid set reads back as itself, and writes the same text again', () => {
    fc.assert(
      fc.property(anySet, (set) => {
        const text = writeSet(set)
        const back = readSet(text)
        if (!back.ok) throw new Error(back.problems[0]?.message)
        expect(back.value).toEqual(set)
        expect(writeSet(back.value)).toBe(text)
      }),
      { numRuns: 200 },
    )
  })

  it('is stable: two spaces, the order of the table, points on one line, a final newline', () => {
    const set = withAt(defaultSet(), 'sweep.points', [
      [0, -1],
      [0.5, 1],
    ])
    const shuffled = Object.fromEntries(Object.entries(set).reverse()) as unknown as ParameterSet
    const text = writeSet(set)
    expect(writeSet(shuffled)).toBe(text)
    expect(text).toContain('\n  "sweep": {\n    "shape": "sine",\n')
    expect(text).toContain('"points": [\n      [0, -1],\n      [0.5, 1]\n    ]')
    expect(text.endsWith('}\n')).toBe(true)
    expect(Object.keys(JSON.parse(text))).toEqual(Object.keys(defaultSet()))
  })

  it('throws for a set that would not read back', () => {
    expect(() => writeSet(withAt(defaultSet(), 'loop.feedback', 5))).toThrow('loop.feedback')
  })
})
