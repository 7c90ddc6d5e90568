import { describe, expect, it } from 'vitest'
import { blockFace, hertz, LOOP_BLOCKS, MAIN_BLOCKS, type PathBlockId } from '../../../../app/areas/shape/drawing/blocks.ts'
import { readsAt, rulerScale } from '../../../../app/areas/shape/drawing/delays.ts'
import { geometryOf, right, TIGHT_WIDTH } from '../../../../app/areas/shape/drawing/geometry.ts'
import { neighbour } from '../../../../app/areas/shape/drawing/roving.ts'
import { defaultSet, defaultShaper } from '../../../../src/set/defaults.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'

const base = defaultSet()
const one: ParameterSet = {
  ...base,
  layout: 'mono',
  line: { ...base.line, baseMs: 3.5 },
  voices: { ...base.voices, count: 1 },
}
const all = [...MAIN_BLOCKS, ...LOOP_BLOCKS]

describe('the drawing', () => {
  it.each([TIGHT_WIDTH, 67.5, 82.9, 120])('at %d rem holds its width, and no block lies on another', (width) => {
    for (const layout of ['mono', 'stereo', 'monoToStereo'] as const) {
      const { boxes, width: drawn, height } = geometryOf({ ...base, layout }, width)
      expect(drawn).toBeLessThanOrEqual(width + 1e-9)
      for (const a of all) {
        expect(boxes[a].x).toBeGreaterThanOrEqual(0)
        expect(right(boxes[a])).toBeLessThanOrEqual(drawn)
        expect(boxes[a].y + boxes[a].height).toBeLessThanOrEqual(height)
        for (const b of all.filter((id) => id !== a)) {
          const apart =
            right(boxes[a]) <= boxes[b].x ||
            right(boxes[b]) <= boxes[a].x ||
            boxes[a].y + boxes[a].height <= boxes[b].y ||
            boxes[b].y + boxes[b].height <= boxes[a].y
          expect(apart, `${a} and ${b}`).toBe(true)
        }
      }
    }
  })

  it('the loop leaves the line, passes damping first and g last, and comes back to the sum', () => {
    const { boxes, dots, sum } = geometryOf(base, 82.9)
    const tap = dots[1] as { x: number; y: number }
    expect(tap.x).toBeGreaterThan(right(boxes.damping))
    expect(tap.x).toBeLessThan(right(boxes.line))
    expect(boxes.damping.x).toBeGreaterThan(boxes.lowCut.x)
    expect(boxes.lowCut.x).toBeGreaterThan(boxes.loopShaper.x)
    expect(boxes.loopShaper.x).toBeGreaterThan(boxes.feedback.x)
    expect(boxes.feedback.x).toBeGreaterThan(sum.x)
  })

  it('dry leaves before the sum or after it, as dryTap says', () => {
    const from = (dryTap: 'input' | 'line') => geometryOf({ ...base, mix: { ...base.mix, dryTap } }, 82.9)
    expect(from('input').dots[0]?.x).toBeLessThan(from('input').sum.x)
    expect(from('line').dots[0]?.x).toBeGreaterThan(from('line').sum.x)
    expect(from('line').dots[0]?.x).toBeLessThan(from('line').boxes.line.x)
  })

  it('two lines are drawn double, one line single, and one line with two outputs double from the voices on', () => {
    const doubles = (layout: ParameterSet['layout']) => geometryOf({ ...base, layout }, 82.9).wires.filter((wire) => wire.double).length
    expect(doubles('mono')).toBe(0)
    expect(doubles('stereo')).toBe(geometryOf(base, 82.9).wires.length)
    expect(doubles('monoToStereo')).toBe(4)
    expect(geometryOf({ ...base, layout: 'mono' }, 82.9).cross).toBeNull()
  })

  it('what carries nothing is idle: no feedback, no dry, no wet', () => {
    const idle = (change: Partial<ParameterSet>) => geometryOf({ ...one, ...change }, 82.9).wires.filter((wire) => wire.idle).length
    expect(idle({ loop: { ...one.loop, feedback: 0.5 } })).toBe(0)
    expect(idle({ loop: { ...one.loop, feedback: 0 } })).toBe(5)
    expect(idle({ loop: { ...one.loop, feedback: 0.5 }, mix: { ...one.mix, dry: 0 } })).toBe(1)
    expect(idle({ loop: { ...one.loop, feedback: 0.5 }, mix: { ...one.mix, wet: 0 } })).toBe(3)
  })
})

describe('the blocks', () => {
  const text = (id: PathBlockId, set: ParameterSet) => blockFace(id, set).text

  it('are absent when they do nothing', () => {
    const absent = all.filter((id) => text(id, base) === null)
    expect(absent).toEqual(['inputShaper', 'wetTone', 'outputShaper', 'feedback', 'loopShaper', 'lowCut', 'damping'])
  })

  it('carry today’s values', () => {
    const set: ParameterSet = {
      ...one,
      input: { gainDb: -6, shaper: null },
      loop: { ...one.loop, feedback: -0.62, dampingHz: 6500, lowCutHz: 80, shaper: { ...defaultShaper('tanh'), drive: 2 } },
      mix: { ...one.mix, wetLowCutHz: 120, wetHighCutHz: 6000, invertRight: true },
    }
    expect(blockFace('inputShaper', set)).toMatchObject({ title: 'Input gain', text: '−6.00\u00a0dB' })
    expect(text('feedback', set)).toBe('−0.62')
    expect(text('damping', set)).toBe('6.5 kHz')
    expect(text('lowCut', set)).toBe('80 Hz')
    expect(text('loopShaper', set)).toBe('tanh × 2.00')
    expect(text('wetTone', set)).toBe('120 Hz to 6 kHz')
    expect(text('mix', set)).toBe('dry 0.71 wet ±0.71')
    expect(text('voices', set)).toBe('1 · Lagrange 3')
  })

  it('frequencies change to kilohertz at a thousand', () => {
    expect([999, 1000, 12_345].map((hz) => hertz(hz))).toEqual(['999 Hz', '1 kHz', '12.3 kHz'])
    expect(hertz(null)).toBeNull()
  })
})

describe('the reads of the line', () => {
  it('stand at base at position 0 and a depth above it at a quarter', () => {
    expect(readsAt(one, 0).voices.map((read) => read.delayMs)).toEqual([3.5])
    expect(readsAt(one, 0.25).voices[0]?.delayMs).toBeCloseTo(6, 9)
  })

  it('of voices and channels keep their offsets', () => {
    // Oracle: two voices half a cycle apart, channels a quarter: sin 0, sin π, sin π/2, sin 3π/2 times 2.5 ms, spread ± 2 ms.
    const set: ParameterSet = { ...base, line: { ...base.line, baseMs: 12 }, voices: { count: 2, phaseSpread: 360, spreadMs: 4 } }
    const delays = readsAt(set, 0).voices.map((read) => Number(read.delayMs.toFixed(6)))
    expect(delays).toEqual([10, 14, 12.5, 11.5])
  })

  it('the loop reads without the spread, and at base when it is fixed', () => {
    const set: ParameterSet = { ...base, layout: 'mono', loop: { ...base.loop, feedback: 0.5 } }
    expect(readsAt(set, 0.25).loop[0]?.delayMs).toBeCloseTo(14.5, 9)
    expect(readsAt({ ...set, loop: { ...set.loop, delay: 'fixed' } }, 0.25).loop[0]?.delayMs).toBeCloseTo(12, 9)
  })

  it('lie on the ruler, the dry delay too', () => {
    const set: ParameterSet = { ...one, mix: { ...one.mix, dryDelayMs: 9 } }
    expect(rulerScale(one)).toMatchObject({ minMs: 1, maxMs: 6 })
    expect(rulerScale(set).endMs).toBeGreaterThan(9)
  })
})

describe('arrows', () => {
  it('lead along the path, down to the loop and up again, and stop at the ends', () => {
    expect(neighbour('line', 'ArrowRight')).toBe('voices')
    expect(neighbour('line', 'ArrowDown')).toBe('loopShaper')
    expect(neighbour('damping', 'ArrowUp')).toBe('line')
    expect(neighbour('outputShaper', 'ArrowRight')).toBeNull()
    expect(neighbour('damping', 'Home')).toBe('feedback')
    expect(neighbour('voices', 'x')).toBeNull()
  })

  it('reach every block', () => {
    const reached = new Set<PathBlockId>(['line'])
    for (const id of reached)
      for (const key of ['ArrowLeft', 'ArrowRight', 'ArrowUp', 'ArrowDown']) {
        const next = neighbour(id, key)
        if (next) reached.add(next)
      }
    expect([...reached].sort()).toEqual([...all].sort())
  })
})
