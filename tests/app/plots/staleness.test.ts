import { afterEach, beforeEach, describe, expect, it, vi } from 'vitest'
import { type Staleness, staleness } from '../../../app/plots/staleness.ts'
import { currentSet } from '../../../app/state/current.ts'
import { restoreDocument } from '../../../app/state/document.ts'
import { dropGesture, tryOut } from '../../../app/state/draft.ts'
import { defaultSet } from '../../../src/set/defaults.ts'

let now = 0
let frame: FrameRequestCallback = () => {}
let age: Staleness
let paled = 0

function pass(ms: number) {
  now += ms
  frame(now)
}

beforeEach(() => {
  vi.stubGlobal('requestAnimationFrame', (callback: FrameRequestCallback) => {
    frame = callback
    return 1
  })
  vi.spyOn(performance, 'now').mockImplementation(() => now)
  restoreDocument({ slots: { A: defaultSet() }, slot: 'A' })
  paled = 0
  age = staleness(() => {
    paled += 1
  })
})

afterEach(() => {
  age.stop()
  dropGesture()
  vi.restoreAllMocks()
  vi.unstubAllGlobals()
})

describe('what is drawn of an older set', () => {
  it('pales once, 300 ms after the last change, and is fresh again with the new figures', () => {
    age.shows(currentSet())
    pass(1000)
    expect(age.isStale()).toBe(false)
    tryOut('x', defaultSet())
    pass(200)
    tryOut('x', { ...defaultSet(), name: 'Later' })
    pass(200)
    expect(age.isStale()).toBe(false)
    pass(150)
    pass(16)
    expect([age.isStale(), paled]).toEqual([true, 1])
    age.shows(currentSet())
    pass(1000)
    expect([age.isStale(), paled]).toEqual([false, 1])
  })

  it('is not stale before there is anything to see', () => {
    tryOut('x', defaultSet())
    pass(1000)
    expect(age.isStale()).toBe(false)
  })
})
