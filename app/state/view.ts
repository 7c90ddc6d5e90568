// How the page is being looked at: never history, kept for the tab.
import { create } from 'zustand'

export type PlotId = 'response' | 'sweep' | 'map' | 'loop' | 'scope' | 'curve'
export type BlockId =
  | 'set'
  | 'inputShaper'
  | 'line'
  | 'voices'
  | 'wetTone'
  | 'mix'
  | 'outputShaper'
  | 'feedback'
  | 'loopShaper'
  | 'lowCut'
  | 'damping'

export interface ViewState {
  readonly block: BlockId
  /** What stands in the left column: the fields of the block, or the panel. */
  readonly column: 'fields' | 'panel'
  /** The two plots shown, upper and lower; on a narrow page only the upper. */
  readonly plots: readonly [PlotId, PlotId]
  /** Sweep position held by the user, null while it follows the sound. */
  readonly held: number | null
  readonly theme: 'system' | 'light' | 'dark'
  readonly letterKeys: boolean
  readonly openCheck: string | null
  readonly tempoBpm: number
}

export const useView = create<ViewState>()(() => ({
  block: 'line',
  column: 'fields',
  plots: ['response', 'sweep'],
  held: null,
  theme: 'system',
  letterKeys: true,
  openCheck: null,
  tempoBpm: 110,
}))
