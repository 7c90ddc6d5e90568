// Ten minutes of sound at 48 kHz under random live edits: the output stays finite and bounded, and the engine comes to rest afterwards.
import { expect, it } from 'vitest'
import {
  type BypassMode,
  createEngine,
  type DelayChange,
  engineCounters,
  holdPosition,
  processEngine,
  resetEngine,
  retargetEngine,
  setBypass,
  setDelayChange,
} from '../../src/dsp/engine.ts'
import { FLAT_PARAMETERS, flatten } from '../../src/set/flat.ts'
import { noise } from './noise.ts'
import { random, randomSet } from './sets.ts'

const FS = 48000
const MINUTES = 10
const BLOCK = 480

/** Loops stay below 0.9, and a moving cubic gains at most 1.25, filters and cross-fades included; gains are at most +3 dB in, +3 dB out and 8 voices. */
const BOUND = 1000

/** Slots that change together: each field by itself, but a whole loop shaper, whose drive and ceiling only bound the loop together. */
const slots = FLAT_PARAMETERS.map((_, i) => i)
const inLoopShaper = (i: number) => FLAT_PARAMETERS[i]!.path.startsWith('loop.shaper.')
const FIELDS = [...slots.filter((i) => !inLoopShaper(i)).map((i) => [i]), slots.filter(inLoopShaper)]

it.each([20261201])(`ten minutes of random live edits give finite output, seed %i`, { timeout: 300000 }, (seed) => {
  const r = random(seed)
  const sets = Array.from({ length: 200 }, () => randomSet(r.integer(0, 2 ** 31)))
  const flats = sets.map((set) => flatten(set))
  const source = [noise(1, FS), noise(2, FS)]
  const silence = [new Float64Array(BLOCK), new Float64Array(BLOCK)]
  const input = [new Float64Array(BLOCK), new Float64Array(BLOCK)]
  const output = [new Float64Array(BLOCK), new Float64Array(BLOCK)]
  const engine = createEngine(sets[0]!, { sampleRate: FS, maxDelayMs: 200 })
  const flat = Float64Array.from(flats[0]!)
  let peak = 0
  let edits = 0
  let quiet = false
  for (let block = 0; block < (MINUTES * 60 * FS) / BLOCK; block++) {
    if (r.chance(0.3)) {
      edits++
      // Mostly one field, as a hand does it; sometimes all at once, as choosing another set does.
      const from = r.of(flats)
      if (r.chance(0.1)) flat.set(from)
      else for (const slot of r.of(FIELDS)) flat[slot] = from[slot]!
      retargetEngine(engine, flat)
    }
    if (r.chance(0.005)) setBypass(engine, r.of<BypassMode>(['off', 'off', 'hard', 'tails', 'wetOnly']))
    if (r.chance(0.01)) holdPosition(engine, r.chance(0.5) ? null : r.between(-2, 2))
    if (r.chance(0.01)) setDelayChange(engine, r.of<DelayChange>(['glide', 'crossfade']))
    if (r.chance(0.0005)) resetEngine(engine)
    if (r.chance(0.003)) quiet = !quiet
    const at = r.integer(0, FS - BLOCK)
    for (let c = 0; c < 2; c++) input[c]!.set(source[c]!.subarray(at, at + BLOCK))
    processEngine(engine, quiet ? silence : input, output, BLOCK)
    for (const y of output) for (let n = 0; n < BLOCK; n++) peak = Math.max(peak, Math.abs(y[n]!))
  }
  expect(edits).toBeGreaterThan(10000)
  expect(engineCounters(engine).nonFinite).toBe(0)
  expect(peak).toBeLessThan(BOUND)
  expect(peak).toBeGreaterThan(0.1)
  // At rest: back to a plain set and silence, the tail dies away completely.
  setBypass(engine, 'off')
  holdPosition(engine, null)
  retargetEngine(engine, flats[0]!)
  for (let block = 0; block < (30 * FS) / BLOCK; block++) processEngine(engine, silence, output, BLOCK)
  expect(Math.max(...output.map((y) => y.reduce((m, v) => Math.max(m, Math.abs(v)), 0)))).toBe(0)
})
