// combwright: check, response, sweep, render and new on parameter sets.
//   npm run -s combwright -- <command> …     exit 0 good, 1 a check fails, 2 bad use or bad input
import { run } from './program.ts'

// A reader that has seen enough closes the pipe (`… | head`): that is no failure of ours.
process.stdout.on('error', (error: NodeJS.ErrnoException) => {
  if (error.code === 'EPIPE') process.exit()
  throw error
})
process.stderr.on('error', () => undefined)

// Set, not exit(): what is still on its way through a pipe gets there.
process.exitCode = await run(process.argv.slice(2))
