// Where each key of the page's state is kept, and what is accepted when it is read back. A key that is forgotten here does not compile.
// The document's sets are judged by src/set/parse.ts.
import type { DocumentState } from './document.ts'
import type { SessionState } from './session.ts'
import type { ViewState } from './view.ts'

type Guard = (value: unknown) => boolean

/** `tab`: with the tab's working state. `browser`: shared by every tab of this browser. `never`: gone on reload. */
export type Keep = 'never' | { readonly where: 'tab' | 'browser'; readonly accepts: Guard }
export type KeepTable<T> = Readonly<Record<keyof T, Keep>>

const tab = (accepts: Guard): Keep => ({ where: 'tab', accepts })
const browser = (accepts: Guard): Keep => ({ where: 'browser', accepts })

const oneOf =
  (...choices: readonly string[]): Guard =>
  (value) =>
    choices.includes(value as string)
const isBoolean: Guard = (value) => typeof value === 'boolean'
const between =
  (min: number, max: number): Guard =>
  (value) =>
    typeof value === 'number' && value >= min && value <= max
const orNull =
  (guard: Guard): Guard =>
  (value) =>
    value === null || guard(value)
const isObject = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null

const BLOCKS = ['set', 'inputShaper', 'line', 'voices', 'wetTone', 'mix', 'outputShaper', 'feedback', 'loopShaper', 'lowCut', 'damping']
const isPlot = oneOf('response', 'sweep', 'map', 'loop', 'scope', 'curve')

export const KEEP_DOCUMENT: KeepTable<DocumentState> = {
  slots: tab(isObject),
  slot: tab(oneOf('A', 'B', 'C', 'D')),
  step: 'never',
}

export const KEEP_VIEW: KeepTable<ViewState> = {
  block: tab(oneOf(...BLOCKS)),
  column: tab(oneOf('fields', 'panel')),
  plots: tab((value) => Array.isArray(value) && value.length === 2 && value.every(isPlot)),
  held: tab(orNull(between(0, 1))),
  // theme.ts keeps it, under a key that is read before the bundle.
  theme: 'never',
  letterKeys: browser(isBoolean),
  openCheck: tab(orNull((value) => typeof value === 'string')),
  tempoBpm: tab(between(20, 400)),
}

export const KEEP_SESSION: KeepTable<SessionState> = {
  status: 'never',
  playing: 'never',
  cautionRead: browser(isBoolean),
  cautionOpen: 'never',
  loading: 'never',
  overview: 'never',
  // A file's sound and a device's permission do not survive: only phrases come back.
  source: tab((value) => isObject(value) && value.kind === 'phrase' && typeof value.id === 'string'),
  repeat: tab(orNull((value) => isObject(value) && between(0, 1e6)(value.startS) && between(0, 1e6)(value.endS))),
  toneHz: tab(between(10, 24_000)),
  bypass: tab(oneOf('off', 'hard', 'tails', 'wetOnly')),
  bypassMode: tab(oneOf('hard', 'tails', 'wetOnly')),
  equalLoudness: tab(isBoolean),
  equalDb: 'never',
  // Every visit starts quiet.
  levelDb: 'never',
  muted: tab(isBoolean),
  delayChange: tab(oneOf('glide', 'crossfade')),
  guard: 'never',
  guardState: 'never',
  remark: 'never',
  delaysHeld: 'never',
  error: 'never',
  contextRate: 'never',
  headphones: 'never',
  devices: 'never',
  outputs: 'never',
  outputId: 'never',
}

/** The keys of a state that are kept in one place. */
export function pick<T extends object>(state: T, table: KeepTable<T>, where: 'tab' | 'browser'): Partial<T> {
  return Object.fromEntries(keysOf(table, where).map((key) => [key, state[key]])) as Partial<T>
}

/** What of something read back is accepted; the rest keeps its default. */
export function accepted<T extends object>(read: unknown, table: KeepTable<T>, where: 'tab' | 'browser'): Partial<T> {
  if (!isObject(read)) return {}
  const good = keysOf(table, where).filter((key) => {
    const keep = table[key]
    return keep !== 'never' && Object.hasOwn(read, key) && keep.accepts(read[key as string])
  })
  return Object.fromEntries(good.map((key) => [key, read[key as string]])) as Partial<T>
}

function keysOf<T>(table: KeepTable<T>, where: 'tab' | 'browser'): (keyof T)[] {
  return (Object.keys(table) as (keyof T)[]).filter((key) => {
    const keep = table[key]
    return keep !== 'never' && keep.where === where
  })
}
