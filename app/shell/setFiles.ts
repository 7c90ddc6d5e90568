// Opening, starting and saving sets. A file that cannot be read is refused with every reason; what was open stays.
import type { DemoSet } from '../../src/set/demoSets.ts'
import type { Problem } from '../../src/set/result.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { commit, committedSet, useDocument } from '../state/document.ts'
import { endGesture } from '../state/draft.ts'
import { announce } from './announce.ts'
import { canPickPlace, chooseFile, download, type PickedPlace, pickPlace, writeTo } from './fileAccess.ts'
import { dismissRefusals, say } from './messages.ts'
import { loadOrSay } from './usePopup.ts'

/** Nothing this long is a set: it is refused before it is read. */
const LARGEST_FILE_BYTES = 1024 * 1024

let place: PickedPlace | null = null

/** Lets the user choose a set file and opens it. */
export async function chooseSetFile(): Promise<void> {
  const file = await chooseFile('.json,application/json')
  if (file) await openSetFile(file)
}

/** Opens a chosen or dropped set file as one step of history. */
export async function openSetFile(file: File): Promise<void> {
  if (file.size > LARGEST_FILE_BYTES) {
    refuse(file.name, [`it is ${Math.round(file.size / 1024)} KB long; a set file has at most ${LARGEST_FILE_BYTES / 1024} KB`])
    return
  }
  try {
    await openText(file.name, await file.text())
  } catch {
    refuse(file.name, ['the browser could not read it; it may have been moved or changed'])
  }
}

/** Opens one of the sets that come with the page. */
export async function openDemoSet(demo: DemoSet): Promise<void> {
  try {
    const response = await fetch(`./${demo.file}`)
    if (!response.ok) throw new Error(response.statusText)
    await openText(demo.name, await response.text())
  } catch {
    refuse(demo.name, ['it could not be fetched from where this page came from'])
  }
}

/** The reader comes with the first file: its parser with positions is no part of the first load. */
const loadReader = () => import('../../src/set/read.ts').catch(() => null)

async function openText(name: string, text: string): Promise<void> {
  const reader = await loadReader()
  if (reader === null) return refuse(name, ['the part of the page that reads files could not be fetched: try again'])
  const result = reader.readSet(text)
  if (result.ok) open(`Open ${result.value.name || name}`, result.value)
  else refuse(name, result.problems.map(problemLine))
}

/** Starts a new set, as one step of history. */
export function newSet(set: ParameterSet): void {
  open(`New ${set.intent}`, set)
}

function open(step: string, set: ParameterSet): void {
  endGesture()
  place = null
  dismissRefusals()
  commit(step, set)
  announce(`${step}: done`)
}

const loadWriter = () => import('../../src/set/write.ts').then(({ writeSet }) => writeSet)

/** The writer comes with the first change: saving must not need the server the page came from. */
export function prepareSaving(): void {
  const stop = useDocument.subscribe(() => {
    stop()
    void loadWriter().catch(() => {})
  })
}

/** Writes to the file chosen before, else downloads. */
export async function saveSet(): Promise<void> {
  endGesture()
  const writeSet = await loadOrSay(loadWriter)
  if (writeSet === null) return
  const set = committedSet()
  if (place === null) {
    download(fileName(set), new Blob([writeSet(set)], { type: 'application/json' }))
    announce(`${fileName(set)} handed to the browser’s downloads`)
    return
  }
  try {
    await writeTo(place, writeSet(set))
    announce(`Saved to ${place.name}`)
  } catch {
    say('refusal', `“${place.name}” was not written`, ['The browser no longer lets the page write there: choose Save as.'])
    place = null
  }
}

/** Lets the user choose where, where the browser can; else downloads. */
export async function saveSetAs(): Promise<void> {
  if (!canPickPlace()) return saveSet()
  endGesture()
  const picked = await pickPlace(fileName(committedSet()))
  if (picked === null) return
  place = picked
  await saveSet()
}

/** "narrow-resonant-sweep.set.json": letters and digits of the name, the rest as hyphens. */
export function fileName(set: ParameterSet): string {
  const stem = set.name
    .normalize('NFKD')
    .toLowerCase()
    .replace(/\p{M}/gu, '')
    .replace(/[^\p{L}\p{N}]+/gu, '-')
    .replace(/^-+|-+$/g, '')
    .slice(0, 60)
  return `${stem || 'unnamed'}.set.json`
}

function refuse(name: string, lines: readonly string[]): void {
  say('refusal', `“${name}” was not opened; what was open stays`, lines)
}

/** Message and hint of one problem: path, value and range are in the message. */
export const problemLine = (problem: Problem): string => (problem.hint ? `${problem.message}: ${problem.hint}` : problem.message)
