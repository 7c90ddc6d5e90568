// What the commands print and write, against closed forms and the shapes that others script against (DESIGN 8).
import { createHash } from 'node:crypto'
import { readFileSync, writeFileSync } from 'node:fs'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import { renderSet } from '../../src/dsp/render.ts'
import { readWav, writeWav } from '../../src/media/wav.ts'
import { defaultSet } from '../../src/set/defaults.ts'
import { startingSet } from '../../src/set/intents.ts'
import { readSet } from '../../src/set/read.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { writeSet } from '../../src/set/write.ts'
import { resampleTo } from '../../src/signal/resample.ts'
import { compiledCommand, demoSet, type Typed, typed, workFolder } from './typed.ts'

const { folder, files, clear } = workFolder()
let command: readonly string[]
const at = (name: string) => path.join(folder, name)
const run = (...words: string[]): Promise<Typed> => typed(folder, words, { command })
const json = async (...words: string[]) => {
  const { code, stdout, stderr } = await run(...words, '--json')
  expect(stderr).not.toContain('error:')
  expect(stdout.trimEnd()).not.toContain('\n')
  return { code, value: JSON.parse(stdout) }
}
const wav = (name: string) => {
  const result = readWav(readFileSync(at(name)))
  if (!result.ok) throw new Error(result.reason)
  return result.value
}

/** Mono, still, linear: y = dry x + wet w[n − M], w = x + g w[n − M]. */
const M = 48
const G = -0.5
const comb: ParameterSet = {
  ...defaultSet(),
  layout: 'mono',
  line: { baseMs: 1, interpolation: 'linear' },
  sweep: { ...defaultSet().sweep, rateHz: 0, depthMs: 0 },
  voices: { count: 1, phaseSpread: 0, spreadMs: 0 },
  loop: { ...defaultSet().loop, feedback: G },
  mix: { ...defaultSet().mix, dry: 0.8, wet: 0.6 },
}
const forward: ParameterSet = { ...comb, loop: { ...comb.loop, feedback: 0 }, mix: { ...comb.mix, dry: 1, wet: 1 } }
const noise = (frames: number, seed = 1) => {
  let x = seed
  return Float64Array.from({ length: frames }, () => {
    x = (x * 16807) % 2147483647
    return Math.fround(x / 2147483647 - 0.5)
  })
}

beforeAll(async () => {
  command = await compiledCommand(folder)
  writeFileSync(at('comb.set.json'), writeSet(comb))
  writeFileSync(at('forward.set.json'), writeSet(forward))
  writeFileSync(at('noise.wav'), writeWav([noise(20000)], 48000, 'float32'))
  writeFileSync(at('pair.wav'), writeWav([noise(5000, 1), noise(5000, 2)], 48000, 'float32'))
  writeFileSync(at('other.wav'), writeWav([noise(4410)], 44100, 'pcm16'))
})
afterAll(clear)

describe('response', () => {
  it('prints the feed-forward comb: |1 + z^-M| and its phase', async () => {
    const { code, value } = await json('response', 'forward.set.json', '--position', '0.3', '--frequencies', '100,250 Hz,1k')
    expect(code).toBe(0)
    expect(Object.keys(value)).toEqual(['position', 'sampleRate', 'channels'])
    expect(Object.keys(value.channels[0])).toEqual(['frequenciesHz', 'db', 'phaseRad', 'groupDelaySamples'])
    expect(value).toMatchObject({ position: 0.3, sampleRate: 48000, channels: [{ frequenciesHz: [100, 250, 1000] }] })
    // FACTS 1: sqrt(b0² + bM² + 2 b0 bM cos ωM), 1 ms, both 1: 2 |cos πfτ|; the phase of its middle, −πfτ; delay M/2.
    value.channels[0].frequenciesHz.forEach((f: number, i: number) => {
      const c = Math.cos(Math.PI * f * 0.001)
      expect(value.channels[0].db[i]).toBeCloseTo(20 * Math.log10(2 * Math.abs(c)), 8)
      expect(Math.cos(value.channels[0].phaseRad[i] + Math.PI * f * 0.001)).toBeCloseTo(Math.sign(c), 10)
      expect(value.channels[0].groupDelaySamples[i]).toBeCloseTo(24, 6)
    })
  })

  it('adds notches at odd multiples of 1/(2τ) and peaks between', async () => {
    const { value } = await json('response', 'forward.set.json', '--points', '2', '--extremes')
    expect(value.channels[0].frequenciesHz).toEqual([20, 20000])
    expect(Object.keys(value.extremes[0])).toEqual(['channel', 'kind', 'frequencyHz', 'db'])
    const first = value.extremes.filter((e: { frequencyHz: number }) => e.frequencyHz < 2100)
    expect(first.map((e: { kind: string }) => e.kind)).toEqual(['notch', 'peak', 'notch', 'peak'])
    first.forEach((e: { frequencyHz: number }, i: number) => {
      expect(e.frequencyHz).toBeCloseTo(500 * (i + 1), 1)
    })
  })

  it('prints CSV for people and spreadsheets: a header, a row a frequency and channel', async () => {
    const { code, stdout } = await run('response', demoSet('two-takes'), '--points', '3')
    const lines = stdout.trimEnd().split('\n')
    expect(code).toBe(0)
    expect(lines[0]).toBe('channel,frequencyHz,db,phaseRad,groupDelaySamples')
    expect(lines).toHaveLength(7)
    expect(lines[6]).toMatch(/^1,20000,/)
  })

  it('holds a standing sweep where it stands, any other at 0, unless told', async () => {
    const positionOf = async (rateHz: number, ...words: string[]) => {
      writeFileSync(at('stands.set.json'), writeSet({ ...forward, sweep: { ...forward.sweep, rateHz, startPhase: 0.3 } }))
      return (await json('response', 'stands.set.json', '--points', '1', ...words)).value.position
    }
    expect(await positionOf(0)).toBe(0.3)
    expect(await positionOf(1)).toBe(0)
    expect(await positionOf(0, '--position', '0.7')).toBe(0.7)
  })

  it('ends its points at half the rate of a slow set', async () => {
    writeFileSync(at('slow.set.json'), writeSet({ ...forward, sampleRate: 16000 }))
    const { value } = await json('response', 'slow.set.json', '--points', '4')
    expect(value.channels[0].frequenciesHz.at(-1)).toBe(8000)
  })
})

describe('sweep', () => {
  it('prints delay and cents of a sine sweep', async () => {
    // FACTS 4: 5 ms at 1 Hz bends by +53.6 and −55.3 cents.
    const one = { ...defaultSet(), layout: 'mono' as const, voices: { count: 1, phaseSpread: 0, spreadMs: 0 } }
    writeFileSync(at('sine.set.json'), writeSet({ ...one, sweep: { ...one.sweep, rateHz: 1, depthMs: 5 } }))
    const { value } = await json('sweep', 'sine.set.json', '--points', '4')
    expect(value.positions).toEqual([0, 0.25, 0.5, 0.75])
    expect(Object.keys(value.voices[0])).toEqual(['channel', 'voice', 'delayMs', 'cents'])
    const [{ delayMs, cents }] = value.voices
    ;[12, 17, 12, 7].forEach((ms, i) => {
      expect(delayMs[i]).toBeCloseTo(ms, 9)
    })
    ;[-55.3, 0, 53.6, 0].forEach((c, i) => {
      expect(cents[i]).toBeCloseTo(c, 1)
    })
  })

  it('says that a standing sweep never comes to delays below 0', async () => {
    writeFileSync(at('deep.set.json'), writeSet({ ...forward, sweep: { ...forward.sweep, depthMs: 5 } }))
    const { code, stderr } = await run('sweep', 'deep.set.json', '--points', '4')
    expect(code).toBe(0)
    expect(stderr).toBe('deep.set.json: delays below 0 are where the sweep never comes: at rate 0 it stands at 0\n')
    expect((await run('sweep', 'forward.set.json', '--points', '4')).stderr).toBe('')
  })

  it('lists every voice of every channel', async () => {
    const { stdout } = await run('sweep', demoSet('three-slow-voices'), '--points', '2')
    const lines = stdout.trimEnd().split('\n')
    expect(lines[0]).toBe('position,channel,voice,delayMs,cents')
    expect(lines).toHaveLength(1 + 2 * 2 * 3)
  })
})

describe('render', () => {
  it('plays the difference equation', async () => {
    expect(await run('render', 'comb.set.json', 'noise.wav', 'out.wav')).toMatchObject({ code: 0, stdout: '' })
    const { channels, sampleRate, format } = wav('out.wav')
    expect({ sampleRate, format, count: channels.length }).toEqual({ sampleRate: 48000, format: 'float32', count: 1 })
    const x = noise(20000)
    const w = new Float64Array(x.length)
    x.forEach((u, n) => {
      w[n] = u + G * (w[n - M] ?? 0)
    })
    const y = channels[0] as Float64Array
    // Single precision in the file: 3e-7 of the peak.
    x.forEach((u, n) => {
      expect(Math.abs((y[n] as number) - (0.8 * u + 0.6 * (w[n - M] ?? 0)))).toBeLessThan(3e-7)
    })
  })

  it('writes what the library renders, the same every time, tail included', async () => {
    const set = readSet(readFileSync(demoSet('three-slow-voices'), 'utf8'))
    if (!set.ok) throw new Error('demo')
    const expected = writeWav(renderSet(set.value, [noise(5000, 1), noise(5000, 2)], { tailSeconds: 0.05 }), 48000, 'float32')
    for (const name of ['first.wav', 'second.wav']) {
      const { value } = await json('render', demoSet('three-slow-voices'), 'pair.wav', name, '--tail', '50 ms')
      expect(value).toMatchObject({
        output: name,
        format: 'double',
        sampleRate: 48000,
        channels: 2,
        frames: 7400,
        tailSeconds: 0.05,
        resampledFrom: null,
      })
      expect(readFileSync(at(name)).equals(expected)).toBe(true)
    }
  })

  it('hashes the same as when this was written', async () => {
    // A triangle sweep: no trigonometry, so that only a change of ours can change it.
    const set: ParameterSet = { ...defaultSet(), sweep: { ...defaultSet().sweep, shape: 'triangle', rateHz: 5 } }
    writeFileSync(at('triangle.set.json'), writeSet(set))
    await run('render', 'triangle.set.json', 'pair.wav', 'hashed.wav')
    expect(
      createHash('sha256')
        .update(readFileSync(at('hashed.wav')))
        .digest('hex'),
    ).toBe(HASH)
  })

  it('resamples a file at another rate and says so', async () => {
    const { code, stderr } = await run('render', 'comb.set.json', 'other.wav', 'resampled.wav')
    expect(code).toBe(0)
    expect(stderr).toContain("other.wav: resampled from 44100 Hz to the set's 48000 Hz")
    const [x] = resampleTo(wav('other.wav').channels, 44100, 48000)
    const [y] = renderSet(comb, [x as Float64Array])
    const [found] = wav('resampled.wav').channels
    expect(found?.length).toBe(4800)
    expect(Array.from(found as Float64Array)).toEqual(Array.from(y as Float64Array, Math.fround))
  })

  it('averages more channels than the layout takes, and says so', async () => {
    const { stderr } = await run('render', 'comb.set.json', 'pair.wav', 'averaged.wav')
    expect(stderr).toContain('pair.wav: 2 channels, averaged')
    const mean = noise(5000, 1).map((a, i) => (a + (noise(5000, 2)[i] as number)) / 2)
    const [expected] = renderSet(comb, [mean])
    const [found] = wav('averaged.wav').channels
    expect(found?.[4999]).toBeCloseTo(expected?.[4999] as number, 6)
  })

  it('--tail ring goes on until the loop has fallen by 60 dB', async () => {
    // FACTS 1: T60 = 3 τ/−log10 |g|: g = 0.5, 1 ms gives 9.966 ms; the longest way through adds 1 ms.
    const { value } = await json('render', 'comb.set.json', 'noise.wav', 'ring.wav', '--tail', 'ring')
    expect(value.tailSeconds).toBeCloseTo(0.010966, 4)
  })

  it('leaves nothing behind but its output', () => {
    expect(files().filter((name) => name.startsWith('.'))).toEqual([])
  })
})

describe('check', () => {
  it('prints the shape that others script against', async () => {
    const { code, value } = await json('check', demoSet('narrow-resonant-sweep'))
    expect(code).toBe(0)
    expect(Object.keys(value)).toEqual(['set', 'verdict', 'checks'])
    expect(value.set).toBe('Narrow resonant sweep')
    expect(['holds', 'near']).toContain(value.verdict)
    const ids = value.checks.map((check: { id: string }) => check.id)
    expect(ids).toEqual(
      expect.arrayContaining([
        'loop.stability',
        'loop.margin',
        'loop.poles',
        'loop.ring',
        'response.extremes',
        'sweep.range',
        'sweep.detune',
        'sweep.fusion',
      ]),
    )
    for (const check of value.checks) {
      expect(Object.keys(check).slice(0, 7)).toEqual(['id', 'status', 'value', 'limit', 'unit', 'text', 'working'])
      expect(['holds', 'near', 'fails', 'note']).toContain(check.status)
    }
  })

  it('exits 1 when a check fails, and with --fail-on near already when one is near', async () => {
    // Headroom is not what is looked at here.
    const limits = { 'level.peak': 60, 'level.line': 60 }
    const loop = (feedback: number) => writeSet({ ...comb, limits, sweep: { ...comb.sweep, rateHz: 1 }, loop: { ...comb.loop, feedback } })
    writeFileSync(at('runaway.set.json'), loop(1.2))
    writeFileSync(at('near.set.json'), loop(0.97))
    const codes = async (...words: string[]) => (await run('check', ...words)).code
    expect(await codes('runaway.set.json')).toBe(1)
    expect(await codes('near.set.json')).toBe(0)
    expect(await codes('near.set.json', '--fail-on', 'near')).toBe(1)
    expect(await codes('forward.set.json', '--fail-on', 'near')).toBe(0)
  })

  it('judges at another rate: what clears the write point at 48 kHz does not at 8', async () => {
    const set = { ...comb, line: { baseMs: 1, interpolation: 'lagrange3' as const }, sweep: { ...comb.sweep, rateHz: 1, depthMs: 0.95 } }
    writeFileSync(at('rate.set.json'), writeSet({ ...set, loop: { ...set.loop, feedback: 0 } }))
    expect((await run('check', 'rate.set.json')).code).toBe(0)
    expect((await run('check', 'rate.set.json', '--rate', '8 kHz')).code).toBe(1)
  })

  it('lets no name forge a line of the report', async () => {
    writeFileSync(at('forged.set.json'), JSON.stringify({ format: 'combwright-set', version: 1, name: 'mine: holds\nfails  \u001b[31m' }))
    const { stdout } = await run('check', 'forged.set.json')
    expect(stdout).toMatch(/^mine: holds fails {2} ?\[31m: holds\n/)
    expect(stdout.split('\n').filter((line) => line.startsWith('fails'))).toEqual([])
  })

  it('reads well: a line a check under the verdict', async () => {
    const { stdout } = await run('check', demoSet('three-slow-voices'))
    expect(stdout).toMatch(/^Three slow voices: (holds|near)\n/)
    expect(stdout).toMatch(/\n(holds|near |note ) {2}sweep\.detune +\S.*\n/)
  })
})

describe('new', () => {
  it.each(['chorus', 'flanger', 'vibrato', 'doubler', 'comb', 'other'] as const)('%s writes its starting set', async (intent) => {
    const out = `new-${intent}.set.json`
    const { code, value } = await json('new', '--intent', intent, '--out', out)
    expect(code).toBe(0)
    expect(value).toEqual({ out, set: startingSet(intent) })
    expect(readFileSync(at(out), 'utf8')).toBe(writeSet(startingSet(intent)))
  })

  it('writes over a file only when forced', async () => {
    writeFileSync(at('mine.set.json'), 'mine')
    expect((await run('new', '--intent', 'comb', '--out', 'mine.set.json')).code).toBe(2)
    expect(readFileSync(at('mine.set.json'), 'utf8')).toBe('mine')
    expect((await run('new', '--intent', 'comb', '--out', 'mine.set.json', '--force')).code).toBe(0)
    expect(readFileSync(at('mine.set.json'), 'utf8')).toBe(writeSet(startingSet('comb')))
  })
})

describe('every command', () => {
  it.each(['check', 'response', 'sweep', 'render', 'new'])('%s --help says how it is used, on standard output', async (name) => {
    const { code, stdout, stderr } = await run(name, '--help')
    expect({ code, stderr }).toEqual({ code: 0, stderr: '' })
    expect(stdout).toMatch(new RegExp(`^Usage: combwright ${name} `))
    expect(stdout).toContain('--json')
  })

  it('new --help lists the ranges of the table', async () => {
    const { stdout } = await run('new', '--help')
    expect(stdout).toContain('sweep.rateHz\n      0 to 100 Hz [0.4]\n')
    expect(stdout).toContain('loop.dampingHz\n      1 to 96000 Hz, or null [null]\n')
    expect(stdout).toContain('shaper.curve\n')
  })

  it('ends quietly when its reader has seen enough', async () => {
    const { stderr } = await typed(folder, ['sweep', demoSet('three-slow-voices'), '--points', '100000'], {
      command,
      meanwhile: (child) => child.stdout?.once('data', () => child.stdout?.destroy()),
    })
    expect(stderr).toBe('')
  })

  it('clears away what it began when interrupted, and ends by the signal', async () => {
    // Sixteen cubic reads for two minutes of sound: seconds of work on any machine.
    writeFileSync(at('long.wav'), writeWav([new Float64Array(48000 * 120)], 48000, 'float32'))
    writeFileSync(at('eight.set.json'), writeSet({ ...defaultSet(), voices: { count: 8, phaseSpread: 360, spreadMs: 4 } }))
    const before = files()
    const { code } = await typed(folder, ['render', 'eight.set.json', 'long.wav', 'long-out.wav'], {
      command,
      meanwhile: (child) => setTimeout(() => child.kill('SIGINT'), 1200),
    })
    expect(code).toBe(130)
    expect(files()).toEqual(before)
  })

  it('runs from source as npm runs it, with paths from where it was typed', async () => {
    const env = { INIT_CWD: folder, npm_lifecycle_event: 'combwright' }
    const { code, stdout } = await typed('/', ['sweep', 'comb.set.json', '--points', '1', '--json'], { env })
    expect({ code, positions: JSON.parse(stdout).positions }).toEqual({ code: 0, positions: [0] })
  })
})

const HASH = 'aae69c48f22015d46430f9cc793eb9f5639a5b7af0983810af5d37a45486e5a8'
