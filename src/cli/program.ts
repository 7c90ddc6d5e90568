// The command line as one object, and its run: commander reads the words, our messages say what is wrong with them.
import { Command, CommanderError } from 'commander'
import packageFile from '../../package.json' with { type: 'json' }
import { nearestHint } from '../set/valueProblem.ts'
import { addCheck } from './commands/check.ts'
import { addNew } from './commands/new.ts'
import { addRender } from './commands/render.ts'
import { addResponse } from './commands/response.ts'
import { addSweep } from './commands/sweep.ts'
import { CommandFailure, EXIT_BAD_USE, EXIT_GOOD, type Fault, lowerFirst, printFailure } from './failure.ts'

const ABOUT = `Checks, measures and renders modulated-delay effects from their parameter sets (*.set.json).

Data goes to standard output, talk to standard error. Exit: 0 good, 1 a check fails, 2 bad use or bad input.`

export interface Session {
  exitCode: number
}

function buildProgram(session: Session): Command {
  const program = new Command('combwright').description(ABOUT).version(packageFile.version, '-V, --version', 'print the version')
  program.helpOption('-h, --help', 'print this help').helpCommand('help [command]', 'print the help of a command')
  program.showSuggestionAfterError().configureHelp({ helpWidth: 110 })
  // Our own printing replaces commander's: one error, one hint.
  program.exitOverride().configureOutput({ outputError: () => undefined, writeErr: () => undefined })
  for (const add of [addCheck, addResponse, addSweep, addRender, addNew]) add(program, session)
  for (const command of program.commands) command.helpOption('-h, --help', 'print this help')
  return program
}

/** Runs one command line (without the program's own name) to its exit code. Never throws. */
export async function run(words: readonly string[]): Promise<number> {
  const session: Session = { exitCode: EXIT_GOOD }
  const program = buildProgram(session)
  try {
    await program.parseAsync(words, { from: 'user' })
    return session.exitCode
  } catch (error) {
    if (error instanceof CommanderError) {
      if (error.exitCode === 0) return EXIT_GOOD
      printFailure(wordFailure(error, words, program))
      return EXIT_BAD_USE
    }
    printFailure(error)
    return EXIT_BAD_USE
  }
}

/** Commander's refusal in our form. */
function wordFailure(error: CommanderError, words: readonly string[], program: Command): CommandFailure {
  const command = program.commands.find((candidate) => candidate.name() === words[0])
  const help = command ? `'combwright ${command.name()} --help' shows how it is used` : "'combwright --help' lists the commands"
  if (error.code === 'commander.help') return new CommandFailure(helpFault(words, program, help))
  const [said = '', suggestion] = error.message.split('\n')
  const meant = suggestion?.match(/Did you mean (?:one of )?(.*)\?/)?.[1]
  const text = said.replace(/^error: /, '').replace(/\.$/, '')
  return new CommandFailure({
    error: lowerFirst(text.replace(/\. (.)/g, (_, letter: string) => `: ${letter.toLowerCase()}`)),
    hint: meant ? `did you mean ${meant}?` : help,
  })
}

/** Commander answers both an empty command line and `help` for an unknown command with its help. */
function helpFault(words: readonly string[], program: Command, help: string): Fault {
  const [, asked] = words
  if (words[0] !== 'help' || asked === undefined) return { error: 'no command given', hint: help }
  const names = program.commands.map((command) => command.name())
  return { error: `unknown command '${asked}'`, hint: nearestHint(asked, names) ?? help }
}
