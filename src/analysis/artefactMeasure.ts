// Artefacts of one choice of interpolators and updates against the reference.
//
// e = read − reference. What stands still in e is a filter (an interpolator's mean loss), no artefact: it is told apart by the coherence of e with the
// reference, bin by bin over the stretches of a group: H = Σ X* E / Σ |X|², standing Σ |H X|², moving Σ |E − H X|² · M/(M − 1).
// Sources: J. S. Bendat, A. G. Piersol, "Random Data", coherent output power; P. D. Welch 1967 (averaging windowed transforms) (both from memory). For a
// tone it is what a THD+N meter reads, which takes the tone itself out at whatever level it has.
import { LOOPS } from '../dsp/runs.ts'
import type { Interpolation } from '../set/types.ts'
import type { Spectrum } from '../signal/fft.ts'
import { createMotion, type Motion, type MotionRead, runMotion, startMotion, type Updates } from './artefactMotion.ts'
import { type ArtefactStage, LEAD, muteLeaps, readExactly, type Stretch, sumOf, windowed } from './artefactStage.ts'

/** How the voices and the loop are read; `reference`: by the long windowed sinc, to see what updates alone do. */
export interface ReadChoice {
  readonly voices: Interpolation | 'reference'
  readonly loop: Interpolation | 'reference'
  readonly updates: Updates
}

/** Powers by bin, 0 … fs/2, of one group of stretches. */
export interface GroupPower {
  readonly signal: Float64Array
  readonly moving: Float64Array
  readonly standing: Float64Array
}

export interface MeasuredPower {
  readonly cycle: GroupPower
  readonly steepest: GroupPower
}

export interface Measured {
  readonly voices: MeasuredPower
  readonly loop: MeasuredPower | null
}

/** Measures `choice` on every stretch; yields the part done. */
export function* measureSteps(stage: ArtefactStage, choice: ReadChoice): Generator<number, Measured> {
  const motion = createMotion(stage.set, stage.sampleRate, choice.updates, stage.loops)
  const bins = stage.length / 2 + 1
  const groups = { cycle: createGroup(bins), steepest: createGroup(bins) }
  const loopGroups = { cycle: createGroup(bins), steepest: createGroup(bins) }
  for (const [i, stretch] of stage.stretches.entries()) {
    const errors = errorsOf(stage, stretch, motion, choice)
    const voices = sumOf(errors.slice(0, stretch.voices.length))
    collect(groups[stretch.group], stretch.wet, windowed(stage.window, voices))
    const loop = errors[stretch.voices.length]
    if (loop && stretch.fed) collect(loopGroups[stretch.group], stretch.fed, windowed(stage.window, loop))
    yield (i + 1) / stage.stretches.length
  }
  const finished = ({ cycle, steepest }: typeof groups): MeasuredPower => ({ cycle: powersOf(cycle), steepest: powersOf(steepest) })
  return { voices: finished(groups), loop: stage.loops ? finished(loopGroups) : null }
}

/** e of every voice, and of the loop where it counts. */
function errorsOf({ length }: ArtefactStage, stretch: Stretch, motion: Motion, choice: ReadChoice): Float64Array[] {
  const tracks = [...stretch.voices, ...(stretch.loop ? [stretch.loop] : [])]
  const outs = tracks.map(() => new Float64Array(LEAD + length))
  const reads = tracks.map((track, k): MotionRead => {
    const kind = track.read === LOOPS ? choice.loop : choice.voices
    const out = outs[k] as Float64Array
    return kind === 'reference' ? { r: track.read, kind: 'linear', line: null, out } : { r: track.read, kind, line: track.line, out }
  })
  startMotion(motion, stretch.phase)
  runMotion(motion, reads, -LEAD, LEAD + length)
  return tracks.map((track, k) => {
    const out = (outs[k] as Float64Array).subarray(LEAD)
    // Read by the reference at the delays of every sample, it is the reference.
    if (reads[k]?.line === null && choice.updates.every === 1) return new Float64Array(length)
    const read = reads[k]?.line === null ? readExactly(track.line, out) : out
    for (let j = 0; j < length; j++) read[j] = (read[j] as number) - (track.reference[j] as number)
    muteLeaps(read, track.leaps, choice.updates.every)
    return read
  })
}

interface Group {
  count: number
  readonly signal: Float64Array
  readonly error: Float64Array
  readonly crossRe: Float64Array
  readonly crossIm: Float64Array
}

const createGroup = (bins: number): Group => ({
  count: 0,
  signal: new Float64Array(bins),
  error: new Float64Array(bins),
  crossRe: new Float64Array(bins),
  crossIm: new Float64Array(bins),
})

function collect(group: Group, x: Spectrum, e: Spectrum): void {
  const { signal, error, crossRe, crossIm } = group
  group.count++
  for (let k = 0; k < signal.length; k++) {
    const [xr, xi, er, ei] = [x.re[k] as number, x.im[k] as number, e.re[k] as number, e.im[k] as number]
    signal[k] = (signal[k] as number) + xr * xr + xi * xi
    error[k] = (error[k] as number) + er * er + ei * ei
    crossRe[k] = (crossRe[k] as number) + xr * er + xi * ei
    crossIm[k] = (crossIm[k] as number) + xr * ei - xi * er
  }
}

/** Bins with less than this part of the strongest bin's power hold no signal, but what the window lets in: nothing in e is owed to that. */
const NO_SIGNAL = 1e-10

function powersOf({ count, signal, error, crossRe, crossIm }: Group): GroupPower {
  const least = NO_SIGNAL * signal.reduce((most, x) => Math.max(most, x), 0)
  const standing = signal.map((x, k) => (x > least ? ((crossRe[k] as number) ** 2 + (crossIm[k] as number) ** 2) / x : 0))
  // H takes one of the stretches' degrees of freedom with it.
  const moving = error.map((e, k) => Math.max(0, e - (standing[k] as number)) * ((signal[k] as number) > least ? count / (count - 1) : 1))
  return { signal, moving, standing }
}
