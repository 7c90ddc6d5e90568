import { describe, expect, it } from 'vitest'
import {
  createPlayer,
  INPUT,
  openInput,
  type Player,
  playSource,
  renderPlayer,
  SAMPLE,
  type SampleMemory,
  setRegion,
  setToneHz,
  TONE,
  usesMemory,
} from '../../../../app/audio/worklet/player.ts'

const FS = 48_000
const PIECE = 128

const memoryOf = (samples: readonly number[] | Float32Array, options: Partial<SampleMemory> = {}): SampleMemory => {
  const channel = Float32Array.from(samples)
  return { id: 1, channels: [channel], frames: channel.length, circular: false, ...options }
}

/** Everything the player gives in `frames` frames, both channels. */
function play(player: Player, frames: number, input: readonly Float32Array[] = [], piece = PIECE) {
  const left = new Float64Array(frames)
  const right = new Float64Array(frames)
  const l = new Float64Array(PIECE)
  const r = new Float64Array(PIECE)
  for (let at = 0; at < frames; at += piece) {
    const count = Math.min(piece, frames - at)
    renderPlayer(player, l, r, input, at, count)
    left.set(l.subarray(0, count), at)
    right.set(r.subarray(0, count), at)
  }
  return { left, right }
}

/** A player already past the fade from silence. */
function playing(memory: SampleMemory, start: number, end: number): Player {
  const player = createPlayer(FS, PIECE)
  playSource(player, SAMPLE, memory, start, end)
  player.fadeLeft = 0
  return player
}

describe('the repeat region', () => {
  it('repeats with a period of exactly end − start, whatever the join does', () => {
    // Seeded noise by a linear congruence (Numerical Recipes' constants, from memory): no period of its own.
    let seed = 7
    const noise = Array.from({ length: 20_000 }, () => {
      seed = (Math.imul(seed, 1664525) + 1013904223) | 0
      return seed / 2 ** 32
    })
    const { left } = play(playing(memoryOf(noise), 3000, 9000), 30_000)
    for (let n = 6000; n < 24_000; n++) expect(left[n + 6000]).toBe(left[n])
  })

  it('leaves material that fits together at the seam as it is: a whole number of cycles goes on unbroken', () => {
    const sine = Float32Array.from({ length: 12_000 }, (_, n) => Math.sin((2 * Math.PI * n) / 100))
    const { left } = play(playing(memoryOf(sine), 1000, 6000), 20_000)
    // Oracle: the sine itself. Tolerance: two single-precision roundings of values up to 1.
    for (let n = 0; n < 20_000; n++) expect(Math.abs((left[n] as number) - Math.sin((2 * Math.PI * n) / 100))).toBeLessThan(3e-7)
  })

  it('joins within 5 ms without a step larger than the material has itself, where the ends do not fit', () => {
    const ramp = Float32Array.from({ length: 48_000 }, (_, n) => n / 48_000)
    const { left } = play(playing(memoryOf(ramp), 12_000, 36_000), 60_000)
    const steps = Array.from({ length: 59_999 }, (_, n) => Math.abs((left[n + 1] as number) - (left[n] as number)))
    // Half of full scale over 240 frames, and the ramp's own step twice.
    expect(Math.max(...steps)).toBeLessThan(0.5 / 240 + 4 / 48_000)
    expect(steps.filter((step) => step > 3 / 48_000).length).toBeLessThanOrEqual(2 * 241)
  })

  it('repeats circular memory as a whole bit for bit: no join is heard at the seam', () => {
    const memory = memoryOf(
      Array.from({ length: 1000 }, (_, n) => ((n * 37) % 101) / 101),
      { circular: true },
    )
    const { left } = play(playing(memory, 0, 1000), 5000)
    // The weights of the two heads sum to 1 up to one rounding.
    for (let n = 0; n < 5000; n++) expect(left[n]).toBeCloseTo((memory.channels[0] as Float32Array)[n % 1000] as number, 12)
  })

  it('fades out of the end of a recording that is not circular, instead of reading across its beginning', () => {
    const { left } = play(playing(memoryOf(new Float32Array(9600).fill(1)), 0, 9600), 9700)
    expect(left[9600 - 241]).toBe(1)
    expect(left[9600 - 1]).toBeLessThan(0.01)
    expect(left[9600]).toBe(1)
  })

  it('jumps into a region moved away from under it, and not when the new one still holds the head', () => {
    const memory = memoryOf(Float32Array.from({ length: 48_000 }, (_, n) => n))
    const player = playing(memory, 0, 48_000)
    play(player, 1280)
    setRegion(player, 500, 30_000)
    expect(player.now.frame).toBe(1280)
    setRegion(player, 20_000, 30_000)
    expect(player.now.frame).toBe(20_000)
    play(player, 480)
    expect(player.now.frame).toBe(20_480)
  })

  it.each([
    [0, 0],
    [47_999, 48_000],
    [Number.NaN, Number.NaN],
    [-5, 1e9],
  ])('takes a region from %s to %s without leaving the memory', (start, end) => {
    const player = playing(memoryOf(new Float32Array(48_000).fill(0.25)), start, end)
    const { left } = play(player, 2000)
    expect(left.every((x) => x >= 0 && x <= 0.25)).toBe(true)
  })
})

describe('the player', () => {
  it.each([1, 37, 64, 127])('gives the same samples in pieces of %i frames', (piece) => {
    const make = () => playing(memoryOf(Float32Array.from({ length: 4000 }, (_, n) => Math.sin(n * n))), 700, 2900)
    expect(play(make(), 9000, [], piece)).toEqual(play(make(), 9000))
  })

  it('cross-fades 20 ms from one source to the next and then lets go of the first memory', () => {
    const first = memoryOf(new Float32Array(48_000).fill(1))
    const second = memoryOf(new Float32Array(48_000).fill(-1), { id: 2 })
    const player = playing(first, 0, 48_000)
    playSource(player, SAMPLE, second, 0, 48_000)
    const { left } = play(player, 959)
    expect(left[0]).toBeCloseTo(1, 12)
    expect(left[480]).toBeCloseTo(0, 12)
    expect(usesMemory(player, first)).toBe(true)
    play(player, 1)
    expect(usesMemory(player, first)).toBe(false)
    expect(usesMemory(player, second)).toBe(true)
  })

  it('plays a tone of the frequency asked for at −17 dBFS, the level of the tone phrase', () => {
    const player = createPlayer(FS, PIECE)
    playSource(player, TONE, null, 0, 0)
    player.fadeLeft = 0
    setToneHz(player, 1000)
    const { left } = play(player, FS)
    const crossings = left.filter((x, n) => n > 0 && x >= 0 && (left[n - 1] as number) < 0).length
    expect(crossings).toBe(1000)
    expect(20 * Math.log10(Math.max(...left))).toBeCloseTo(-17, 2)
  })

  it('is silent without input, with a closed gate, and passes both channels once the gate is open', () => {
    const player = createPlayer(FS, PIECE)
    playSource(player, INPUT, null, 0, 0)
    player.fadeLeft = 0
    const input = [new Float32Array(PIECE).fill(0.5), new Float32Array(PIECE).fill(-0.5)]
    expect(play(player, PIECE, []).left.every((x) => x === 0)).toBe(true)
    expect(play(player, PIECE, input).left.every((x) => x === 0)).toBe(true)
    openInput(player, true)
    for (let i = 0; i < 30; i++) play(player, PIECE, input)
    expect(play(player, PIECE, input).left[0]).toBe(0.5)
    expect(play(player, PIECE, input).right[0]).toBe(-0.5)
    // A device that goes away gives empty channels.
    expect(play(player, PIECE, [new Float32Array(0)]).left.every((x) => x === 0)).toBe(true)
  })
})
