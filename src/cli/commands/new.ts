// combwright new --intent flanger --out SET: a starting set.
import type { Command } from 'commander'
import { startingSet } from '../../set/intents.ts'
import { type ChoiceParameter, parameter } from '../../set/parameters.ts'
import type { Intent } from '../../set/types.ts'
import { writeSet } from '../../set/write.ts'
import { readChoice } from '../arguments.ts'
import { checkOutput, writeWhole } from '../files.ts'
import { interruptible } from '../interrupt.ts'
import { printJson, talk } from '../output.ts'
import { parameterHelp } from '../parameterHelp.ts'

interface NewOptions {
  readonly intent: string
  readonly out: string
  readonly force?: boolean
  readonly json?: boolean
}

const INTENTS = (parameter('intent') as ChoiceParameter).options.map((option) => option.value as Intent)

export function addNew(program: Command): void {
  program
    .command('new')
    .description('write a starting set: usual values for an intent, with a small panel')
    .requiredOption('--intent <intent>', INTENTS.join(', '))
    .requiredOption('--out <set>', 'the file to write, by custom NAME.set.json')
    .option('--force', 'write over a file that is already there')
    .option('--json', 'print { out, set } as JSON')
    .addHelpText('after', parameterHelp())
    .action((options: NewOptions) => interruptible((signal) => writeStart(options, signal)))
}

async function writeStart({ intent, out, force = false, json = false }: NewOptions, signal: AbortSignal): Promise<void> {
  const set = startingSet(readChoice(intent, '--intent', INTENTS))
  checkOutput(out, { inputs: [], keep: !force })
  await writeWhole(out, writeSet(set), signal)
  if (json) printJson({ out, set })
  else talk(`wrote ${out}: ${set.name}`)
}
