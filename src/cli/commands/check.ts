// combwright check SET: all checks, their figures, limits and working.
import type { Command } from 'commander'
import { panelBoxSteps } from '../../checks/panelBox.ts'
import { checkSteps, type CheckOptions as Judging, verdictOf } from '../../checks/registry.ts'
import type { Check } from '../../checks/types.ts'
import { type NumberParameter, parameter } from '../../set/parameters.ts'
import type { ParameterSet } from '../../set/types.ts'
import { readChoice, readNumberOption } from '../arguments.ts'
import { checkReport } from '../checkReport.ts'
import { EXIT_CHECK, EXIT_GOOD } from '../failure.ts'
import { readSetFile } from '../files.ts'
import { readMaterial } from '../material.ts'
import { printJson } from '../output.ts'
import type { Session } from '../program.ts'
import { runSteps } from '../runSteps.ts'

interface CheckOptions {
  readonly rate?: string
  readonly panel?: boolean
  readonly material?: string
  readonly failOn: string
  readonly working?: boolean
  readonly json?: boolean
}

const RATE = parameter('sampleRate') as NumberParameter

export function addCheck(program: Command, session: Session): void {
  program
    .command('check')
    .description('judge a set: every check with its figure, limit and working')
    .argument('<set>', 'a set file')
    .option('--rate <hz>', `judge it as if run at this rate, ${RATE.min} to ${RATE.max} Hz`)
    .option('--panel', 'judge it at every position of its knobs as well: adds panel.box, which names the worst places')
    .option('--material <file>', 'measure loudness on this WAV file instead of the built-in plucked chords')
    .option('--fail-on <status>', 'exit 1 on fails, or already on near', 'fails')
    .option('--working', 'print the working of every check, not only of those that fail or are near')
    .option('--json', 'print { set, verdict, checks } as JSON')
    .addHelpText(
      'after',
      "\nExit: 0 no check at or past --fail-on, 1 one is, 2 bad use or bad input.\n'combwright new --help' lists the ranges of a set's values.",
    )
    .action((file: string, options: CheckOptions) => {
      const failOn = readChoice(options.failOn, '--fail-on', ['fails', 'near'])
      const sampleRate = options.rate === undefined ? undefined : readNumberOption(options.rate, { ...RATE, name: '--rate' })
      const set = readSetFile(file)
      const material = options.material === undefined ? undefined : readMaterial(options.material, set, sampleRate ?? set.sampleRate)
      const checks = judged(set, { sampleRate, material }, options.panel ?? false)
      const verdict = verdictOf(checks)
      if (options.json) printJson({ set: set.name, verdict, checks: checks.map(inOrder) })
      else process.stdout.write(checkReport(set, checks, options))
      session.exitCode = verdict === 'fails' || (failOn === 'near' && verdict === 'near') ? EXIT_CHECK : EXIT_GOOD
    })
}

/** All checks, and the panel's worst places after them when asked for. */
function judged(set: ParameterSet, judging: Judging, panel: boolean): Check[] {
  const checks = runSteps('checking', checkSteps(set, judging))
  return panel ? [...checks, runSteps('turning the knobs', panelBoxSteps(set, judging))] : checks
}

/** The keys scripts rely on first, in their order. */
function inOrder({ id, status, value, limit, unit, text, working, ...more }: Check): Check {
  return { id, status, value, limit, unit, text, working, ...more }
}
