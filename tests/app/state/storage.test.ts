import { beforeEach, describe, expect, it, vi } from 'vitest'
import { committedSet, restoreDocument } from '../../../app/state/document.ts'
import { commitField } from '../../../app/state/edit.ts'
import { useSession } from '../../../app/state/session.ts'
import { keepState, restoreState, useSaved } from '../../../app/state/storage.ts'
import { useView } from '../../../app/state/view.ts'
import { defaultSet } from '../../../src/set/defaults.ts'

/** The part of the Storage interface the page uses, in memory. */
class MemoryStorage {
  readonly map = new Map<string, string>()
  full = false
  getItem(key: string) {
    return this.map.get(key) ?? null
  }
  setItem(key: string, value: string) {
    if (this.full) throw new DOMException('full', 'QuotaExceededError')
    this.map.set(key, value)
  }
  removeItem(key: string) {
    this.map.delete(key)
  }
}

let local: MemoryStorage

function newTab() {
  vi.stubGlobal('sessionStorage', new MemoryStorage())
  restoreDocument({ slots: { A: defaultSet() }, slot: 'A' })
  useView.setState({ block: 'line', held: null, tempoBpm: 110, letterKeys: true })
  useSession.setState({ toneHz: 440, cautionRead: false, playing: false, source: { kind: 'phrase', id: 'plucked' } })
}

beforeEach(async () => {
  local = new MemoryStorage()
  vi.stubGlobal('localStorage', local)
  newTab()
  await restoreState()
})

const onlyTab = () => [...local.map.keys()].find((key) => key.startsWith('combwright.tab.')) as string

describe('the working state', () => {
  it('comes back: set, view, listening settings', async () => {
    commitField('sweep.rateHz', 1.25)
    useView.setState({ block: 'mix', tempoBpm: 96 })
    useSession.setState({ toneHz: 880, cautionRead: true })
    expect(keepState()).toBe(true)
    newTab()
    expect(await restoreState()).toEqual([])
    expect(committedSet().sweep.rateHz).toBe(1.25)
    expect(useView.getState()).toMatchObject({ block: 'mix', tempoBpm: 96 })
    expect(useSession.getState()).toMatchObject({ toneHz: 880, cautionRead: true })
  })

  it('a page never starts playing, nor with a file or a device it no longer has', async () => {
    useSession.setState({ playing: true, source: { kind: 'live', deviceId: 'x', label: 'x' } })
    keepState()
    newTab()
    await restoreState()
    expect(useSession.getState().playing).toBe(false)
    expect(useSession.getState().source.kind).toBe('phrase')
  })

  it('two tabs keep their own; a third starts from the one written last', async () => {
    commitField('sweep.rateHz', 1)
    keepState()
    newTab()
    await restoreState()
    commitField('sweep.rateHz', 2)
    keepState()
    expect([...local.map.keys()].filter((key) => key.startsWith('combwright.tab.'))).toHaveLength(2)
    newTab()
    await restoreState()
    expect(committedSet().sweep.rateHz).toBe(2)
  })

  it('broken text is put aside, said, and never shown', async () => {
    keepState()
    const key = onlyTab()
    local.map.set(key, '{"document":')
    newTab()
    const [notice] = await restoreState()
    expect(notice).toContain('could not be read')
    expect(local.map.get('combwright.unreadable')).toBe('{"document":')
    expect(committedSet()).toEqual(defaultSet())
  })

  it('an invalid set is refused as a file’s would be', async () => {
    commitField('sweep.rateHz', 1)
    keepState()
    const key = onlyTab()
    local.map.set(key, (local.map.get(key) as string).replace('"rateHz":1', '"rateHz":1e9'))
    newTab()
    const [notice] = await restoreState()
    expect(notice).toContain('sweep.rateHz')
    expect(committedSet()).toEqual(defaultSet())
  })

  it('view values that make no sense keep their defaults', async () => {
    useView.setState({ tempoBpm: 96 })
    keepState()
    const key = onlyTab()
    local.map.set(
      key,
      (local.map.get(key) as string).replace('"tempoBpm":96', '"tempoBpm":"fast"').replace('"block":"line"', '"block":"moon"'),
    )
    newTab()
    await restoreState()
    expect(useView.getState()).toMatchObject({ tempoBpm: 110, block: 'line' })
  })

  it('full storage is said, and said to be over when it is', () => {
    local.full = true
    expect(keepState()).toBe(false)
    expect(useSaved.getState().problem).toContain('full')
    local.full = false
    expect(keepState()).toBe(true)
    expect(useSaved.getState().problem).toBeNull()
  })
})
