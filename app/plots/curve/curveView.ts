// One of the two views of the Curve plot: what both offer to the plot around them.
import type { PlotNumbers, PlotTable } from '../plotTypes.ts'
import type { Shown } from './curveWords.ts'

export interface CurvePlace {
  readonly element: HTMLElement
  /** What is shown now; null until it is computed, or where there is no shaper. */
  shown(): Shown | null
  /** Why there is nothing to show; empty while it is being computed. */
  why(): string
  /** What the reading line should say has changed. */
  changed(): void
}

export interface CurveView {
  /** Draws what is shown now. */
  update(): void
  /** Called every frame. */
  frame(): void
  reading(shown: Shown): string
  summary(shown: Shown): string
  table(shown: Shown): PlotTable
  numbers(shown: Shown): PlotNumbers
  picture(): HTMLCanvasElement
  destroy(): void
}
