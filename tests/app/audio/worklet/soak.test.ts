import { describe, expect, it } from 'vitest'
import { createAudition, receive, render } from '../../../../app/audio/worklet/audition.ts'
import { defaultSet } from '../../../../src/set/defaults.ts'
import { FLAT_PARAMETERS, flatten } from '../../../../src/set/flat.ts'
import type { Parameter } from '../../../../src/set/parameters.ts'
import { createRandom } from '../../../../src/signal/random.ts'
import { LISTENER } from './listener.ts'

const FS = 48_000
const QUANTUM = 128
const SECONDS = 600
/** Quanta between two edits: about eight a second, more than a hand makes. */
const EDIT_EVERY = 48

/** A value anywhere in the table's range; now and then one that no table allows. */
function anyValue(p: Parameter, u: number, wild: boolean): number {
  if (wild) return [Number.NaN, Number.POSITIVE_INFINITY, -1e9, 1e9][Math.floor(u * 4)] as number
  if (p.kind === 'choice') return Math.floor(u * p.options.length)
  if (p.kind === 'boolean') return u < 0.5 ? 0 : 1
  if (p.kind !== 'number' && p.kind !== 'integer') return 0
  if (p.values) return p.values[Math.floor(u * p.values.length)] as number
  const value = p.min + u * (p.max - p.min)
  return p.kind === 'integer' ? Math.round(value) : value
}

describe('ten minutes of random live edits', () => {
  it.each([1])(
    'never give a sample that is no number or above full scale, seed %i',
    (seed) => {
      const u = createRandom(seed)
      const audition = createAudition(defaultSet(), FS, LISTENER)
      const sound = Float32Array.from({ length: FS }, () => u() - 0.5)
      receive(audition, { type: 'source', source: { type: 'sample', id: 1, channels: [sound, sound], circular: true, start: 0, end: FS } })
      const flat = flatten(defaultSet())
      const input = [sound.subarray(0, QUANTUM)]
      const output = [new Float32Array(QUANTUM), new Float32Array(QUANTUM)] as const
      const quanta = Math.floor((SECONDS * FS) / QUANTUM)
      let worst = 0
      let loud = 0
      for (let q = 0; q < quanta; q++) {
        if (q % EDIT_EVERY === 0) {
          for (let edits = Math.ceil(u() * 3); edits > 0; edits--) {
            const slot = Math.floor(u() * FLAT_PARAMETERS.length)
            flat[slot] = anyValue(FLAT_PARAMETERS[slot] as Parameter, u(), u() < 0.02)
          }
          receive(audition, { type: 'set', flat })
          if (u() < 0.1) receive(audition, { type: 'resume' })
          if (u() < 0.1) {
            const bypass = (['off', 'off', 'hard', 'tails', 'wetOnly'] as const)[Math.floor(u() * 5)] ?? 'off'
            const delayChange = u() < 0.5 ? 'glide' : 'crossfade'
            receive(audition, {
              type: 'settings',
              settings: { ...LISTENER, bypass, delayChange, held: u() < 0.2 ? u() : null, equalDb: 24 * u() - 12 },
            })
          }
          if (u() < 0.05) receive(audition, { type: 'region', id: 1, start: u() * FS, end: u() * FS })
        }
        render(audition, input, output, q * QUANTUM)
        for (const channel of output) {
          for (let i = 0; i < QUANTUM; i++) {
            const x = Math.abs(channel[i] as number)
            // NaN compares false with everything: it must show as the worst.
            if (!(x <= worst)) worst = Number.isNaN(x) ? Number.POSITIVE_INFINITY : x
          }
        }
        if (Math.abs(output[0][0] as number) > 1e-3) loud++
      }
      expect(worst).toBeLessThanOrEqual(1)
      // It must have sounded for the rest to mean anything.
      expect(loud).toBeGreaterThan(quanta / 20)
    },
    600_000,
  )
})
