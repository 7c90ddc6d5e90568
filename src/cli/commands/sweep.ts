// combwright sweep SET: delay and detune of every voice over the cycle.
import type { Command } from 'commander'
import { type SweepTable, sweepTable } from '../../analysis/sweepTable.ts'
import { readNumberOption } from '../arguments.ts'
import { readSetFile } from '../files.ts'
import { printCsv, printJson, talk } from '../output.ts'

interface SweepOptions {
  readonly points: string
  readonly json?: boolean
}

const MAX_SWEEP_POINTS = 100000

export function addSweep(program: Command): void {
  program
    .command('sweep')
    .description('print delay and cents of every voice over one cycle')
    .argument('<set>', 'a set file')
    .option('--points <n>', `evenly spaced positions, 1 to ${MAX_SWEEP_POINTS}`, '256')
    .option('--json', 'print { positions, voices } as JSON instead of CSV')
    .addHelpText(
      'after',
      '\nDelays in ms; cents 1200 log2(1 - dτ/dt), empty (null) where a read stalls or runs backwards. A drift is shown as a sine.\nPositions are those of the first voice; the others keep their phase.',
    )
    .action((file: string, options: SweepOptions) => {
      const points = readNumberOption(options.points, { name: '--points', unit: '', min: 1, max: MAX_SWEEP_POINTS, whole: true })
      const set = readSetFile(file)
      const table = sweepTable(set, points)
      // Only a set that stands still can be valid and yet hold such delays.
      if (table.voices.some(({ delayMs }) => delayMs.some((ms) => ms < 0)))
        talk(`${file}: delays below 0 are where the sweep never comes: at rate 0 it stands at ${set.sweep.startPhase}`)
      if (options.json) printJson(table)
      else printCsv(['position', 'channel', 'voice', 'delayMs', 'cents'], rows(table))
    })
}

function* rows({ positions, voices }: SweepTable): Iterable<readonly (number | null)[]> {
  for (const { channel, voice, delayMs, cents } of voices)
    for (const [i, position] of positions.entries()) yield [position, channel, voice, delayMs[i] as number, cents[i] as number | null]
}
