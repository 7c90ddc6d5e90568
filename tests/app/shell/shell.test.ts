import { beforeEach, describe, expect, it, vi } from 'vitest'
import { verdictText } from '../../../app/shell/Announcer.tsx'
import { layoutFor } from '../../../app/shell/layout.ts'
import { dismissNewest, useMessages } from '../../../app/shell/messages.ts'
import { fileName, newSet, openSetFile } from '../../../app/shell/setFiles.ts'
import { committedSet, restoreDocument, undo } from '../../../app/state/document.ts'
import { defaultSet } from '../../../src/set/defaults.ts'
import { startingSet } from '../../../src/set/intents.ts'
import { writeSet } from '../../../src/set/write.ts'

const file = (text: string, name = 'x.set.json') => new File([text], name, { type: 'application/json' })
const lines = () => useMessages.getState().messages.flatMap((message) => [message.title, ...message.lines])

beforeEach(() => {
  useMessages.setState({ messages: [] })
  restoreDocument({ slots: { A: defaultSet() }, slot: 'A' })
})

describe('opening a set file', () => {
  it('is one step of history', async () => {
    const set = startingSet('flanger')
    await openSetFile(file(writeSet(set)))
    expect(committedSet()).toEqual(set)
    expect(undo()).toBe(`Open ${set.name}`)
    expect(committedSet()).toEqual(defaultSet())
    expect(lines()).toEqual([])
  })

  const head = '"format":"combwright-set","version":1'
  it.each([
    ['broken JSON', '{"format":', /line 1/i],
    ['nothing', '', /empty|JSON/i],
    ['another document', '[1, 2]', /JSON object/],
    ['a future version', '{"format":"combwright-set","version":99}', /99/],
    ['an unknown key', `{${head},"loop":{"feedbak":0.5}}`, /loop\.feedbak/],
    ['a wrong type', `{${head},"loop":{"feedback":"much"}}`, /loop\.feedback.*-2 to 2.*"much"/],
    ['a value out of range', `{${head},"loop":{"feedback":3}}`, /loop\.feedback.*-2 to 2.*3/],
    ['a read before the write point', `{${head},"line":{"baseMs":1},"sweep":{"depthMs":2.5}}`, /line\.baseMs/],
  ])('refuses %s, says why, and keeps what was open', async (_, text, why) => {
    const before = committedSet()
    await openSetFile(file(text))
    expect(committedSet()).toBe(before)
    expect(lines()[0]).toBe('“x.set.json” was not opened; what was open stays')
    expect(lines().slice(1).join(' ')).toMatch(why)
  })

  it('refuses a file of megabytes without reading it', async () => {
    const big = file(' '.repeat(2 * 1024 * 1024), 'big.json')
    const text = vi.spyOn(big, 'text')
    await openSetFile(big)
    expect(text).not.toHaveBeenCalled()
    expect(lines()[1]).toContain('2048 KB')
  })

  it('a message leaves when it is dismissed', async () => {
    await openSetFile(file(''))
    expect(dismissNewest()).toBe(true)
    expect(lines()).toEqual([])
    expect(dismissNewest()).toBe(false)
  })
})

describe('a new set', () => {
  it.each(['chorus', 'flanger', 'vibrato', 'doubler', 'comb', 'other'] as const)('for %s is one step', (intent) => {
    newSet(startingSet(intent))
    expect(committedSet()).toEqual(startingSet(intent))
    expect(undo()).toBe(`New ${intent}`)
  })
})

describe('names and words', () => {
  it.each([
    ['Narrow resonant sweep', 'narrow-resonant-sweep.set.json'],
    ['Größe  2/3', 'große-2-3.set.json'],
    ['../../etc', 'etc.set.json'],
    ['  ', 'unnamed.set.json'],
  ])('%j is saved as %s', (name, expected) => {
    expect(fileName({ ...defaultSet(), name })).toBe(expected)
  })

  it('a verdict is counted in words', () => {
    expect(verdictText('fails', 1, 2)).toBe('1 fails, 2 near')
    expect(verdictText('near', 0, 1)).toBe('1 near')
    expect(verdictText('holds', 0, 0)).toBe('all hold')
  })
})

describe('the layout', () => {
  it.each([
    [1366, 640, 16, 'wide', true],
    [1366, 768, 16, 'wide', true],
    [1366, 500, 16, 'wide', false],
    [1000, 700, 16, 'medium', false],
    [390, 844, 16, 'narrow', false],
    [320, 700, 16, 'narrow', false],
    // Text at 200 % narrows the page as half the window would.
    [1366, 768, 32, 'narrow', false],
  ] as const)('%d × %d px at %d px a rem is %s, fills the window: %s', (width, height, rem, layout, fits) => {
    expect(layoutFor(width, height, rem)).toEqual({ layout, fits })
  })
})
