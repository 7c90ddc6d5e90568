// How a command says no: `error:` and `hint:` on standard error, lower case, no full stop, no stack; exit 2.
// A check that fails is no failure of the command: it is a result, and exits 1.
import type { Problem } from '../set/result.ts'
import { oneLine } from './output.ts'

export const EXIT_GOOD = 0
export const EXIT_CHECK = 1
export const EXIT_BAD_USE = 2

const MOST_SHOWN = 20

export interface Fault {
  readonly error: string
  readonly hint: string
}

/** Bad use or bad input. Thrown by commands, printed once by main. */
export class CommandFailure extends Error {
  readonly faults: readonly Fault[]

  constructor(...faults: readonly Fault[]) {
    super(faults[0]?.error)
    this.faults = faults
  }
}

export const fail = (error: string, hint: string): never => {
  throw new CommandFailure({ error, hint })
}

/** Others' messages begin with a capital; ours do not. */
export const lowerFirst = (text: string): string => text.charAt(0).toLowerCase() + text.slice(1)

const RANGES_HINT = "'combwright new --help' lists every parameter with its range"

/** The problems of a file, as faults that begin with its name. */
export function problemFaults(file: string, problems: readonly Problem[]): readonly Fault[] {
  const shown = problems.slice(0, MOST_SHOWN).map(({ message, hint }) => ({ error: `${file}: ${message}`, hint: hint ?? RANGES_HINT }))
  const more = problems.length - shown.length
  return more > 0 ? [...shown, { error: `${file}: ${more} more problems`, hint: 'mend the first ones and run it again' }] : shown
}

/** Prints what went wrong. Anything that is no CommandFailure is a lack of memory or a mistake of ours, and is said to be one. */
export function printFailure(error: unknown): void {
  const faults = error instanceof CommandFailure ? error.faults : [ownMistake(error)]
  process.stderr.write(faults.map((fault) => `error: ${oneLine(fault.error)}\nhint: ${oneLine(fault.hint)}\n`).join(''))
}

function ownMistake(error: unknown): Fault {
  const message = error instanceof Error ? error.message : String(error)
  if (/allocation failed|Invalid typed array length/.test(message))
    return { error: 'there is not enough memory for this', hint: 'cut the sound, or its tail, shorter' }
  return { error: `this should not happen: ${message}`, hint: 'please report it with the command as typed and the files it read' }
}
