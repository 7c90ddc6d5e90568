// combwright: check, response, sweep, render and new on parameter sets.
//   npm run -s combwright -- <command> …     exit 0 good, 1 a check fails, 2 bad use or bad input
import { CommandFailure, EXIT_BAD_USE, printFailure } from './failure.ts'
import { reasonOf } from './files.ts'
import { run } from './program.ts'

process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  // A reader that has seen enough closes the pipe (`… | head`): that is no failure of ours.
  if (error.code === 'EPIPE') process.exit()
  printFailure(new CommandFailure({ error: `standard output cannot be written: ${reasonOf(error)}`, hint: 'check where it leads' }))
  process.exit(EXIT_BAD_USE)
})
process.stderr.on('error', () => undefined)

// Set, not exit(): what is still on its way through a pipe gets there.
process.exitCode = await run(process.argv.slice(2))
