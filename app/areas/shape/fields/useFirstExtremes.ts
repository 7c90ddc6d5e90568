// Where the first notch and peak stand at both ends of the sweep. Finding them can take longer than a frame, so it waits until the set
// has rested for a moment, and while a gesture runs it happens a few times a second.
import { useEffect } from 'react'
import { create } from 'zustand'
import { type FirstExtremeRange, firstExtremeRange } from '../../../../src/analysis/firstExtreme.ts'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { currentSet, subscribeSet } from '../../../state/current.ts'

type Ranges = Readonly<Record<'notch' | 'peak', FirstExtremeRange>>

const REST_MS = 40

const useFound = create<{ readonly of: ParameterSet | null; readonly ranges: Ranges | null }>()(() => ({ of: null, ranges: null }))

function find(): void {
  const set = currentSet()
  if (useFound.getState().of === set) return
  useFound.setState({ of: set, ranges: { notch: firstExtremeRange(set, 'notch'), peak: firstExtremeRange(set, 'peak') } })
}

let users = 0
let timer: ReturnType<typeof setTimeout> | undefined
let stop = () => {}

function soon(): void {
  timer ??= setTimeout(() => {
    timer = undefined
    find()
  }, REST_MS)
}

function follow(): () => void {
  users += 1
  if (users === 1) {
    stop = subscribeSet(soon)
    soon()
  }
  return () => {
    users -= 1
    if (users > 0) return
    stop()
    clearTimeout(timer)
    timer = undefined
  }
}

/** Both ranges of the set being shown, null until they were found once. Last known ones while a change is being worked out. */
export function useFirstExtremes(): Ranges | null {
  useEffect(follow, [])
  return useFound((s) => s.ranges)
}
