// A recording of the user's as the material that loudness is measured on.
import type { CheckMaterial } from '../checks/types.ts'
import { inputChannels } from '../dsp/engine.ts'
import type { ParameterSet } from '../set/types.ts'
import { peak } from '../signal/levels.ts'
import { MAX_RESAMPLE_RATE, MAX_RESAMPLED_FRAMES, MIN_RESAMPLE_RATE, resampledLength, resampleTo } from '../signal/resample.ts'
import { fail } from './failure.ts'
import { readWavFile } from './files.ts'
import { talk } from './output.ts'

/** Loudness is measured over blocks of so many seconds (BS.1770). */
const SHORTEST_S = 0.4

/** The WAV file `typed` at `sampleRate` Hz, which is said when it comes from another; a CommandFailure where it cannot be read or is too short, silent or too long. */
export function readMaterial(typed: string, set: ParameterSet, sampleRate: number): CheckMaterial {
  const wav = readWavFile(typed)
  const lines = inputChannels(set.layout)
  if (wav.totalFrames < SHORTEST_S * wav.sampleRate)
    fail(
      `${typed} lasts ${(wav.totalFrames / wav.sampleRate).toFixed(2)} s, and loudness is measured over ${SHORTEST_S} s at least`,
      'give a recording of a second or more',
    )
  if (wav.channels.every((channel) => peak(channel) === 0)) fail(`${typed} is silent`, 'give a recording with sound in it')
  if (wav.channelCount > lines)
    talk(`${typed}: ${wav.channelCount} channels, averaged into ${lines === 1 ? 'the one line' : `each of ${lines} lines`} of the layout`)
  const name = typed.split(/[\\/]/).at(-1) ?? typed
  // A file written at a fractional rate says the whole one: it counts as the same.
  if (wav.sampleRate === Math.round(sampleRate)) return { name, sampleRate, channels: wav.channels }
  if (wav.sampleRate < MIN_RESAMPLE_RATE || wav.sampleRate > MAX_RESAMPLE_RATE)
    fail(
      `${typed} is at ${wav.sampleRate} Hz, and ${MIN_RESAMPLE_RATE} to ${MAX_RESAMPLE_RATE} Hz can be resampled`,
      `export it at ${sampleRate} Hz`,
    )
  if (resampledLength(wav.totalFrames, wav.sampleRate, sampleRate) > MAX_RESAMPLED_FRAMES)
    fail(`${typed} is too long to be resampled to ${sampleRate} Hz`, 'cut the file shorter')
  talk(`${typed}: resampled from ${wav.sampleRate} Hz to ${sampleRate} Hz`)
  return { name, sampleRate, channels: resampleTo(wav.channels, wav.sampleRate, sampleRate) }
}
