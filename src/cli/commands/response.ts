// combwright response SET: the exact response with the sweep held at a position.
import type { Command } from 'commander'
import { type Extreme, frozenExtremes } from '../../analysis/extremes.ts'
import { type Frozen, freeze } from '../../analysis/frozen.ts'
import { type ChannelResponse, frozenResponse } from '../../analysis/response.ts'
import { readNumberList, readNumberOption } from '../arguments.ts'
import { fail } from '../failure.ts'
import { readSetFile } from '../files.ts'
import { printCsv, printJson } from '../output.ts'

interface ResponseOptions {
  readonly position?: string
  readonly frequencies?: string
  readonly points?: string
  readonly extremes?: boolean
  readonly json?: boolean
}

const LOWEST_HZ = 20
const HIGHEST_HZ = 20000
const MAX_RESPONSE_POINTS = 100000
const DEFAULT_POINTS = '200'

export function addResponse(program: Command): void {
  program
    .command('response')
    .description('print the exact response with the sweep held at a position, one block a channel')
    .argument('<set>', 'a set file')
    .option('--position <p>', 'sweep position, 0 to 1 (default: 0, or where a sweep of rate 0 stands)')
    .option('--frequencies <list>', 'frequencies in Hz, commas between them')
    .option(
      '--points <n>',
      `or so many, in equal ratios from ${LOWEST_HZ} Hz to ${HIGHEST_HZ} Hz or half the rate (default ${DEFAULT_POINTS})`,
    )
    .option('--extremes', 'add notches and peaks')
    .option('--json', 'print { position, sampleRate, channels, extremes } as JSON instead of CSV')
    .addHelpText(
      'after',
      '\nLevels in dB, not below -400; phases in radians; group delays in samples. Shapers count by their slope for small signals.\nIn CSV, notches and peaks follow after an empty line.',
    )
    .action((file: string, options: ResponseOptions) => {
      const position =
        options.position === undefined ? undefined : readNumberOption(options.position, { name: '--position', unit: '', min: 0, max: 1 })
      if (options.frequencies !== undefined && options.points !== undefined)
        fail('--frequencies and --points are both given', 'give one of them')
      const set = readSetFile(file)
      const frozen = freeze(set, position ?? (set.sweep.rateHz === 0 ? set.sweep.startPhase : 0))
      refuseHeld(file, frozen)
      const channels = frozenResponse(frozen, readFrequencies(options, frozen.sampleRate))
      const extremes = options.extremes ? frozenExtremes(frozen, { fromDc: true }) : undefined
      if (options.json) printJson(responseJson(frozen, channels, extremes))
      else printResponse(channels, extremes)
    })
}

function readFrequencies({ frequencies, points = DEFAULT_POINTS }: ResponseOptions, sampleRate: number): readonly number[] {
  const hint = `the set runs at ${sampleRate} Hz, and nothing above half of that exists`
  if (frequencies !== undefined)
    return readNumberList(frequencies, { name: '--frequencies', unit: 'Hz', min: 0, max: sampleRate / 2, hint })
  const count = readNumberOption(points, { name: '--points', unit: '', min: 1, max: MAX_RESPONSE_POINTS, whole: true })
  return equalRatios(LOWEST_HZ, Math.min(HIGHEST_HZ, sampleRate / 2), count)
}

/** `count` frequencies from `from` to `to`, both exact, each the same ratio above the one before. */
function equalRatios(from: number, to: number, count: number): number[] {
  if (count === 1) return [from]
  return Array.from({ length: count }, (_, i) => (i === count - 1 ? to : from * (to / from) ** (i / (count - 1))))
}

/** A set that stands still may be valid where it stands and read too close elsewhere. */
function refuseHeld(file: string, { held, position }: Frozen): void {
  const [first] = held
  if (!first) return
  const reader = first.where === 'loop' ? 'the loop' : `voice ${first.voice}`
  fail(
    `${file}: at --position ${position} ${reader} of channel ${first.channel} would read closer than its interpolator allows`,
    'give a position the sweep reaches, or mend base or depth',
  )
}

function responseJson({ position, sampleRate }: Frozen, channels: readonly ChannelResponse[], extremes: readonly Extreme[] | undefined) {
  return {
    position,
    sampleRate,
    channels: channels.map(({ frequenciesHz, db, phaseRad, groupDelaySamples }) => ({ frequenciesHz, db, phaseRad, groupDelaySamples })),
    ...(extremes && { extremes: extremes.map(({ channel, kind, frequencyHz, db }) => ({ channel, kind, frequencyHz, db })) }),
  }
}

function printResponse(channels: readonly ChannelResponse[], extremes: readonly Extreme[] | undefined): void {
  printCsv(
    ['channel', 'frequencyHz', 'db', 'phaseRad', 'groupDelaySamples'],
    channels.flatMap(({ frequenciesHz, db, phaseRad, groupDelaySamples }, c) =>
      Array.from(frequenciesHz, (hz, i) => [c, hz, db[i] as number, phaseRad[i] as number, groupDelaySamples[i] as number]),
    ),
  )
  if (!extremes) return
  process.stdout.write('\n')
  printCsv(
    ['channel', 'kind', 'frequencyHz', 'db'],
    extremes.map(({ channel, kind, frequencyHz, db }) => [channel, kind, frequencyHz, db]),
  )
}
