// The working state across reloads: written to localStorage at each commit and when the page is hidden, under the tab's own id, and
// read before the first paint. A new tab starts from the state written last. Nothing read here is trusted: what judges a set is fetched when
// there is one to judge, so a first visit does without.
import { create } from 'zustand'
import type { Result } from '../../src/set/result.ts'
import type { ParameterSet } from '../../src/set/types.ts'
import { type DocumentState, restoreDocument, type SlotId, useDocument } from './document.ts'
import { accepted, KEEP_DOCUMENT, KEEP_SESSION, KEEP_VIEW, pick } from './keep.ts'
import { useSession } from './session.ts'
import { useView } from './view.ts'

const TAB_PREFIX = 'combwright.tab.'
const LAST_KEY = 'combwright.last'
const BROWSER_KEY = 'combwright.browser'
/** What could not be read is put aside here instead of being written over. */
const UNREADABLE_KEY = 'combwright.unreadable'
const KEPT_TABS = 8

/** Whether the last write reached the browser's storage; the set's line says "saved here" or why not. */
export const useSaved = create<{ readonly problem: string | null }>()(() => ({ problem: null }))

let tabId = ''

/** Reads what was kept into the stores. Returns what the user must be told, empty when all is well. */
export async function restoreState(): Promise<readonly string[]> {
  try {
    tabId = sessionStorage.getItem(LAST_KEY) ?? ''
    const own = tabId === '' ? null : localStorage.getItem(TAB_PREFIX + tabId)
    const text = own ?? localStorage.getItem(TAB_PREFIX + (localStorage.getItem(LAST_KEY) ?? ''))
    if (tabId === '') takeTabId(newId())
    restoreBrowser()
    return text === null ? [] : await restoreTab(text)
  } catch {
    useSaved.setState({ problem: 'this browser keeps nothing for this page' })
    return ['This browser keeps nothing for this page: what you change is gone when it closes. Save your sets as files.']
  }
}

function restoreBrowser(): void {
  const read = parsed(localStorage.getItem(BROWSER_KEY) ?? '{}')
  useView.setState(accepted(read, KEEP_VIEW, 'browser'))
  useSession.setState(accepted(read, KEEP_SESSION, 'browser'))
}

async function restoreTab(text: string): Promise<readonly string[]> {
  const read = parsed(text)
  if (read === undefined) return unreadable(text, 'it is not whole')
  const { document, view, session } = read as Record<string, unknown>
  useView.setState(accepted(view, KEEP_VIEW, 'tab'))
  useSession.setState(accepted(session, KEEP_SESSION, 'tab'))
  const { slots, slot } = accepted<DocumentState>(document, KEEP_DOCUMENT, 'tab')
  const sets: Partial<Record<SlotId, ParameterSet>> = {}
  const parseSet = await loadParser()
  if (parseSet === null) return unreadable(text, 'a part of the page could not be fetched')
  for (const [id, value] of Object.entries(slots ?? {})) {
    const result = parseSet(value)
    if (!result.ok) return unreadable(text, result.problems[0]?.message ?? 'a set is not valid')
    sets[id as SlotId] = result.value
  }
  if (slot === undefined || !sets[slot]) return unreadable(text, 'it holds no set')
  restoreDocument({ slots: sets, slot })
  return []
}

const loadParser = (): Promise<((json: unknown) => Result<ParameterSet>) | null> =>
  import('../../src/set/parse.ts').then(({ parseSet }) => parseSet).catch(() => null)

function unreadable(text: string, reason: string): readonly string[] {
  localStorage.setItem(UNREADABLE_KEY, text)
  return [`What this browser kept could not be read (${reason}). It was put aside; the page starts afresh.`]
}

/** Writes the working state now. Returns whether it was kept. */
export function keepState(): boolean {
  try {
    const state = {
      savedAt: Date.now(),
      document: pick(useDocument.getState(), KEEP_DOCUMENT, 'tab'),
      view: pick(useView.getState(), KEEP_VIEW, 'tab'),
      session: pick(useSession.getState(), KEEP_SESSION, 'tab'),
    }
    const shared = { ...pick(useView.getState(), KEEP_VIEW, 'browser'), ...pick(useSession.getState(), KEEP_SESSION, 'browser') }
    localStorage.setItem(TAB_PREFIX + tabId, JSON.stringify(state))
    localStorage.setItem(LAST_KEY, tabId)
    localStorage.setItem(BROWSER_KEY, JSON.stringify(shared))
    report(null)
    return true
  } catch (error) {
    report(
      error instanceof DOMException && error.name === 'QuotaExceededError'
        ? 'this browser’s storage is full'
        : 'this browser keeps nothing',
    )
    return false
  }
}

function report(problem: string | null): void {
  if (useSaved.getState().problem !== problem) useSaved.setState({ problem })
}

/** Writes at each commit and whenever the page is hidden; returns the way to stop. */
export function watchState(): () => void {
  const stopDocument = useDocument.subscribe((now, before) => {
    if (now.slots !== before.slots || now.slot !== before.slot) keepState()
  })
  const onHide = () => {
    if (document.visibilityState === 'hidden') keepState()
  }
  addEventListener('pagehide', keepState)
  document.addEventListener('visibilitychange', onHide)
  claimTab()
  forgetOldTabs()
  return () => {
    stopDocument()
    removeEventListener('pagehide', keepState)
    document.removeEventListener('visibilitychange', onHide)
  }
}

/** A duplicated tab carries its twin's id: the second to ask for the id's lock takes a new one. */
function claimTab(): void {
  if (!('locks' in navigator)) return
  void navigator.locks.request(TAB_PREFIX + tabId, { ifAvailable: true }, (lock) => {
    if (lock) return new Promise(() => {})
    takeTabId(newId())
    claimTab()
    return undefined
  })
}

function takeTabId(id: string): void {
  tabId = id
  sessionStorage.setItem(LAST_KEY, id)
}

function forgetOldTabs(): void {
  try {
    const age = (key: string) => Number((parsed(localStorage.getItem(key) ?? '') as { savedAt?: unknown } | undefined)?.savedAt) || 0
    const keys = Object.keys(localStorage).filter((key) => key.startsWith(TAB_PREFIX) && key !== TAB_PREFIX + tabId)
    const oldest = keys.sort((a, b) => age(b) - age(a)).slice(KEPT_TABS)
    for (const key of oldest) localStorage.removeItem(key)
  } catch {
    // Nothing is kept, so nothing is old.
  }
}

const newId = () => Math.random().toString(36).slice(2, 10)

/** An object or undefined. */
function parsed(text: string): unknown {
  try {
    const value: unknown = JSON.parse(text)
    return typeof value === 'object' && value !== null ? value : undefined
  } catch {
    return undefined
  }
}
