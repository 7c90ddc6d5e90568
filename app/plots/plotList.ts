// The plots there are, in the order of their tabs. The two shown first come with the page, the others when they are first chosen.
import type { PlotId } from '../state/view.ts'
import type { MountPlot } from './plotTypes.ts'
import { mountResponse } from './response/response.ts'
import { mountSweep } from './sweep/sweep.ts'

export interface PlotEntry {
  readonly id: PlotId
  readonly label: string
  /** Fetches what draws it; rejects when it cannot be had. */
  load(): Promise<MountPlot>
}

export const PLOTS: readonly PlotEntry[] = [
  { id: 'response', label: 'Response', load: async () => mountResponse },
  { id: 'sweep', label: 'Sweep', load: async () => mountSweep },
  { id: 'map', label: 'Map', load: async () => (await import('./map/map.ts')).mountMap },
  { id: 'loop', label: 'Loop', load: async () => (await import('./loop/loop.ts')).mountLoop },
  { id: 'scope', label: 'Scope', load: async () => (await import('./scope/scope.ts')).mountScope },
  { id: 'curve', label: 'Curve', load: async () => (await import('./curve/curve.ts')).mountCurve },
]

export function plotEntry(id: PlotId): PlotEntry {
  const found = PLOTS.find((plot) => plot.id === id)
  if (!found) throw new RangeError(`no plot is called ${id}`)
  return found
}
