// combwright render SET IN.wav OUT.wav: the set's sound, offline and the same every time.
import type { Command } from 'commander'
import { inputChannels } from '../../dsp/engine.ts'
import type { WavAudio } from '../../media/wav.ts'
import { writeWav } from '../../media/wav.ts'
import type { ParameterSet } from '../../set/types.ts'
import { peak } from '../../signal/levels.ts'
import { MAX_RESAMPLE_RATE, MAX_RESAMPLED_FRAMES, MIN_RESAMPLE_RATE, resampledLength, resampleTo } from '../../signal/resample.ts'
import { readChoice, readNumberOption } from '../arguments.ts'
import { fail } from '../failure.ts'
import { checkOutput, readSetFile, readWavFile, writeWhole } from '../files.ts'
import { interruptible } from '../interrupt.ts'
import { printJson, talk } from '../output.ts'
import { startProgress } from '../progress.ts'
import { ENDLESS_RING_S, LONGEST_RING_S, renderInSteps, ringTailSeconds } from '../renderSteps.ts'

interface RenderOptions {
  readonly format: string
  readonly tail: string
  readonly json?: boolean
}

const MAX_TAIL_S = 3600
const LARGEST_WAV_BYTES = 2 ** 32 - 1

export function addRender(program: Command): void {
  program
    .command('render')
    .description('play a WAV file through a set and write the result as WAV')
    .argument('<set>', 'a set file')
    .argument('<in>', 'the WAV file to play')
    .argument('<out>', 'the WAV file to write')
    .option('--format <format>', 'arithmetic: double', 'double')
    .option('--tail <seconds>', `go on so long after the input, 0 to ${MAX_TAIL_S} s, or "ring": until the loop has died away`, '0')
    .option('--json', 'print what was written as JSON')
    .addHelpText('after', RENDER_NOTES)
    .action((set: string, input: string, output: string, options: RenderOptions) => render({ set, input, output }, options))
}

const RENDER_NOTES = `
The result is 32-bit float WAV at the set's rate, as long as the input and its tail. A file at another rate is resampled first, and that is said.
More input channels than the layout takes are averaged, fewer copied. Values above full scale are kept.
--tail ring adds the longest delay and the time in which the loop falls by 60 dB, at most ${LONGEST_RING_S} s; ${ENDLESS_RING_S} s where it does not fall.`

interface Files {
  readonly set: string
  readonly input: string
  readonly output: string
}

async function render(files: Files, options: RenderOptions): Promise<void> {
  readFormat(options.format)
  const typedTail =
    options.tail === 'ring' ? null : readNumberOption(options.tail, { name: '--tail', unit: 's', min: 0, max: MAX_TAIL_S, orElse: 'ring' })
  checkOutput(files.output, { inputs: [files.set, files.input] })
  const set = readSetFile(files.set)
  const wav = readWavFile(files.input)
  const input = atSetRate(wav, set, files.input)
  const tail = Math.round((typedTail ?? ringTailSeconds(set)) * set.sampleRate)
  const rate = Math.round(set.sampleRate)
  if (rate !== set.sampleRate) talk(`${files.output} says ${rate} Hz, as WAV knows whole rates only; the set runs at ${set.sampleRate} Hz`)
  const output = await interruptible(async (signal) => {
    const channels = await play(set, input, tail, { files, signal })
    await writeWhole(files.output, writeWav(channels, rate, 'float32'), signal)
    return channels
  })
  report(files, set, { wav, output, tail, json: options.json ?? false })
}

function readFormat(text: string): void {
  const format = readChoice(text, '--format', ['double', 'float32', 'q31', 'q15'])
  if (format !== 'double')
    fail(
      `--format ${format} has no twin yet: the number formats of the firmware are still to come`,
      'leave it out, or give --format double',
    )
}

/** A file written at a set's fractional rate says the whole one: it counts as the same. */
const sameRate = (wav: WavAudio, set: ParameterSet) => wav.sampleRate === Math.round(set.sampleRate)

function atSetRate(wav: WavAudio, set: ParameterSet, name: string): readonly Float64Array[] {
  const lines = inputChannels(set.layout)
  if (wav.channelCount > lines)
    talk(`${name}: ${wav.channelCount} channels, averaged into ${lines === 1 ? 'the one line' : `each of ${lines} lines`} of the layout`)
  if (sameRate(wav, set)) return wav.channels
  if (wav.sampleRate < MIN_RESAMPLE_RATE || wav.sampleRate > MAX_RESAMPLE_RATE)
    fail(
      `${name} is at ${wav.sampleRate} Hz, and ${MIN_RESAMPLE_RATE} to ${MAX_RESAMPLE_RATE} Hz can be resampled`,
      `export it at ${set.sampleRate} Hz`,
    )
  const frames = resampledLength(wav.totalFrames, wav.sampleRate, set.sampleRate)
  refuseTooLong(name, frames, set)
  if (frames > MAX_RESAMPLED_FRAMES)
    fail(
      `${name} would have ${frames} samples a channel at ${set.sampleRate} Hz, and at most ${MAX_RESAMPLED_FRAMES} are made`,
      'cut the file shorter',
    )
  talk(`${name}: resampled from ${wav.sampleRate} Hz to the set's ${set.sampleRate} Hz`)
  return resampleTo(wav.channels, wav.sampleRate, set.sampleRate)
}

function refuseTooLong(name: string, frames: number, set: ParameterSet): void {
  const bytes = frames * 4 * (set.layout === 'mono' ? 1 : 2) + 100
  if (bytes > LARGEST_WAV_BYTES)
    fail(`${name}: the result would have ${bytes} bytes, where a WAV file holds ${LARGEST_WAV_BYTES}`, 'cut the file, or the tail, shorter')
}

async function play(
  set: ParameterSet,
  input: readonly Float64Array[],
  tail: number,
  { files, signal }: { readonly files: Files; readonly signal: AbortSignal },
): Promise<Float64Array[]> {
  const frames = (input[0] as Float64Array).length + tail
  refuseTooLong(files.input, frames, set)
  const progress = startProgress('rendering', frames)
  try {
    const output = await renderInSteps({ set, input, tail, signal, onStep: progress.update })
    if (Array.isArray(output)) return output
    const seconds = (output.divergedAt / set.sampleRate).toFixed(1)
    return fail(
      `${files.set}: about ${seconds} s in, the sound grows past what a float file holds: the loop runs away`,
      "'combwright check' says why; lower loop.feedback or put a shaper into the loop",
    )
  } finally {
    progress.stop()
  }
}

interface Written {
  readonly wav: WavAudio
  readonly output: readonly Float64Array[]
  readonly tail: number
  readonly json: boolean
}

function report(files: Files, set: ParameterSet, { wav, output, tail, json }: Written): void {
  const frames = (output[0] as Float64Array).length
  const largest = Math.max(...output.map(peak))
  const peakDb = largest === 0 ? null : 20 * Math.log10(largest)
  if (!json) {
    const channels = output.length === 1 ? '1 channel' : `${output.length} channels`
    const level = peakDb === null ? 'silent' : `peak ${peakDb.toFixed(1)} dBFS`
    talk(`wrote ${files.output}: ${channels}, ${(frames / set.sampleRate).toFixed(2)} s, ${level}`)
    return
  }
  printJson({
    ...files,
    format: 'double',
    sampleRate: set.sampleRate,
    channels: output.length,
    frames,
    tailSeconds: tail / set.sampleRate,
    resampledFrom: sameRate(wav, set) ? null : wav.sampleRate,
    peakDb,
  })
}
