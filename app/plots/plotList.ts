// The plots there are, in the order of their tabs.
import type { PlotId } from '../state/view.ts'
import { mountLoop } from './loop/loop.ts'
import type { MountPlot } from './plotTypes.ts'
import { mountResponse } from './response/response.ts'
import { mountScope } from './scope/scope.ts'
import { mountSweep } from './sweep/sweep.ts'

export interface PlotEntry {
  readonly id: PlotId
  readonly label: string
  readonly mount: MountPlot
}

export const PLOTS: readonly PlotEntry[] = [
  { id: 'response', label: 'Response', mount: mountResponse },
  { id: 'sweep', label: 'Sweep', mount: mountSweep },
  { id: 'loop', label: 'Loop', mount: mountLoop },
  { id: 'scope', label: 'Scope', mount: mountScope },
]

export function plotEntry(id: PlotId): PlotEntry {
  const found = PLOTS.find((plot) => plot.id === id)
  if (!found) throw new RangeError(`no plot is called ${id}`)
  return found
}
