// Asks the long lane for the checks at the usual rates, as long as somebody looks, again for every newer set.
import { useEffect, useState } from 'react'
import { currentSet, subscribeSet } from '../../../../state/current.ts'
import { analysis } from '../../../../workers/analysisClient.ts'
import type { Rated } from '../../../../workers/analysisJobs/rates.ts'
import { ratesWith } from './changes.ts'

export interface RatesState {
  readonly ownRate: number
  readonly rated: readonly Rated[]
  /** Rate being worked on and part done; null when all is done. */
  readonly working: { readonly rate: number; readonly part: number } | null
  readonly problem: string | null
}

export function useRates(): RatesState {
  const [state, setState] = useState<RatesState>(begin)
  useEffect(() => {
    const feed = analysis().openFeed(
      'rates',
      ({ rated }) => setState((now) => ({ ...now, rated, working: null })),
      (problem) => setState((now) => ({ ...now, working: null, problem })),
      ({ rated, rate, part }) => setState((now) => ({ ...now, rated, working: { rate, part } })),
    )
    const ask = () => {
      const set = currentSet()
      setState(begin())
      feed.askInstead({ set, rates: ratesWith(set.sampleRate) })
    }
    ask()
    const stop = subscribeSet(ask)
    return () => {
      stop()
      feed.stop()
    }
  }, [])
  return state
}

function begin(): RatesState {
  const { sampleRate } = currentSet()
  return { ownRate: sampleRate, rated: [], working: { rate: sampleRate, part: 0 }, problem: null }
}
