// Paths as typed, sets and sounds read, results written whole or not at all.
import { closeSync, lstatSync, openSync, readFileSync, readSync, realpathSync, type Stats, statSync } from 'node:fs'
import { mkdtemp, rename, rm, writeFile } from 'node:fs/promises'
import path from 'node:path'
import { readWav, type WavAudio } from '../media/wav.ts'
import { MAX_TEXT_BYTES, tooLarge } from '../set/jsonText.ts'
import { readSet } from '../set/read.ts'
import type { ParameterSet } from '../set/types.ts'
import { CommandFailure, fail, problemFaults } from './failure.ts'

/** Where the user stood when typing: npm moves to the package's folder first and leaves the typed one in INIT_CWD. */
function typedFolder(): string {
  const { npm_lifecycle_event: script, INIT_CWD: typed } = process.env
  return script === 'combwright' && typed ? typed : process.cwd()
}

export const resolvePath = (typed: string): string => path.resolve(typedFolder(), typed)

/** Reads a file of at most `maxBytes`; `what` names the argument in messages. */
function readBytes(typed: string, what: string, maxBytes: number, tooMany: (bytes: number) => never): Uint8Array {
  if (typed === '') fail(`the path of ${what} is empty`, 'give the path of a file')
  try {
    const file = resolvePath(typed)
    const found = statSync(file)
    if (found.isCharacterDevice() || found.isBlockDevice()) fail(`${typed} cannot be read: it is a device`, `give the path of ${what}`)
    if (found.size > maxBytes) tooMany(found.size)
    return found.isFIFO() ? readPipe(file, maxBytes, tooMany) : readFileSync(file)
  } catch (error) {
    if (error instanceof CommandFailure) throw error
    return fail(`${typed} cannot be read: ${reasonOf(error)}`, `give the path of ${what}`)
  }
}

/** A pipe says no size beforehand: it is read until it ends, or gives too much. */
function readPipe(file: string, maxBytes: number, tooMany: (bytes: number) => never): Uint8Array {
  const pipe = openSync(file, 'r')
  try {
    const parts: Uint8Array[] = []
    for (let bytes = 0; ; ) {
      const part = new Uint8Array(PIPE_PART)
      const count = readSync(pipe, part)
      if (count === 0) return Buffer.concat(parts)
      bytes += count
      if (bytes > maxBytes) tooMany(bytes)
      parts.push(part.subarray(0, count))
    }
  } finally {
    closeSync(pipe)
  }
}

const PIPE_PART = 2 ** 16

/** The set in a file, valid at its own rate, or a CommandFailure with every problem. */
export function readSetFile(typed: string): ParameterSet {
  const bytes = readBytes(typed, 'a set file', MAX_TEXT_BYTES + 3, (size) => {
    throw new CommandFailure(...problemFaults(typed, [tooLarge(size)]))
  })
  const result = readSet(decodeText(typed, bytes))
  if (result.ok) return result.value
  throw new CommandFailure(...problemFaults(typed, result.problems))
}

function decodeText(typed: string, bytes: Uint8Array): string {
  try {
    return new TextDecoder('utf-8', { fatal: true }).decode(bytes)
  } catch {
    return fail(`${typed}: the file is no UTF-8 text`, 'a set file is JSON text; is it another kind of file?')
  }
}

/** RF64 files may be larger; Node reads no more than this at once. */
const MAX_WAV_BYTES = 2 ** 31 - 1

export function readWavFile(typed: string): WavAudio {
  const bytes = readBytes(typed, 'a WAV file', MAX_WAV_BYTES, (size) =>
    fail(`${typed} has ${size} bytes, where at most ${MAX_WAV_BYTES} are read`, 'cut it into shorter files'),
  )
  const result = readWav(bytes)
  return result.ok ? result.value : fail(`${typed}: ${result.reason}`, result.hint)
}

export interface OutputRules {
  /** Files that are read and so must not be written over. */
  readonly inputs: readonly string[]
  /** Refuse a file that is already there. */
  readonly keep?: boolean
}

/** Refuses an output path that cannot or must not be written, before any work is done. */
export function checkOutput(typed: string, { inputs, keep = false }: OutputRules): void {
  if (typed === '') fail('the output is an empty path', 'give the path of the file to write')
  const refuse = (reason: string, hint: string) => fail(`${typed} cannot be written: ${reason}`, hint)
  const file = resolvePath(typed)
  let there: Stats | undefined
  try {
    if (!statOf(path.dirname(file))?.isDirectory())
      refuse(`there is no folder ${path.dirname(typed)}`, 'make the folder first, or give another path')
    there = statOf(file)
    if (!there && lstatSync(file, { throwIfNoEntry: false }))
      refuse('it is a link that leads nowhere', 'mend the link, or give another path')
  } catch (error) {
    if (error instanceof CommandFailure) throw error
    refuse(reasonOf(error), 'give another path')
  }
  if (there?.isDirectory() || typed.endsWith('/') || typed.endsWith(path.sep)) refuse('it is a folder', 'give the path of a file')
  // Moving a file over a device or a pipe would take its place.
  if (there && !there.isFile()) refuse('it is a device or a pipe', 'give the path of a file')
  const same = inputs.find((input) => identity(input) === identity(typed))
  if (same !== undefined) fail(`the output ${typed} is the input ${same}`, 'give the output another name')
  if (there && keep) fail(`${typed} is already there`, 'give another name, or --force to write over it')
}

function statOf(file: string) {
  return statSync(file, { throwIfNoEntry: false })
}

/** The same for two ways of writing one path, links included. */
function identity(typed: string): string {
  const file = resolvePath(typed)
  try {
    const { dev, ino } = statSync(realpathSync(file), { bigint: true })
    return `${dev}:${ino}`
  } catch {
    return file
  }
}

/**
 * Writes a file whole: into a folder of its own beside the target first, then moved over it, so that no half-written file is ever seen under the
 * name. An aborted signal stops it and clears it away.
 */
export async function writeWhole(typed: string, bytes: Uint8Array | string, signal: AbortSignal): Promise<void> {
  // Through a link, the file it leads to is written, not the link.
  const file = statOf(resolvePath(typed)) ? realpathSync(resolvePath(typed)) : resolvePath(typed)
  let besides: string | undefined
  try {
    besides = await mkdtemp(path.join(path.dirname(file), '.combwright-'))
    const half = path.join(besides, 'half')
    await writeFile(half, bytes, { signal })
    await rename(half, file)
  } catch (error) {
    signal.throwIfAborted()
    fail(`${typed} cannot be written: ${reasonOf(error)}`, 'check the folder, its rights and the room on the disk')
  } finally {
    if (besides) await rm(besides, { recursive: true, force: true })
  }
}

const REASONS: Readonly<Record<string, string>> = {
  ENOENT: 'no such file',
  ENOTDIR: 'a part of its path is no folder',
  EISDIR: 'it is a folder',
  EACCES: 'not permitted',
  EPERM: 'not permitted',
  EROFS: 'the disk is read-only',
  ENOSPC: 'the disk is full',
  EFBIG: 'it is too large for the disk',
  ELOOP: 'its links go in a circle',
  ENAMETOOLONG: 'its name is too long',
  ERR_INVALID_ARG_VALUE: 'its path holds a zero byte',
}

/** A system's error in words. */
export function reasonOf(error: unknown): string {
  const { code = 'unknown reason' } = error as { code?: string }
  return REASONS[code] ?? code
}
