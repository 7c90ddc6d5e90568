// What a plot needs of the place it is drawn in, and what it offers there: a reading, a sentence, a table, numbers, a picture.

/** Where a plot is mounted: its element fills with the plot; the reading line above belongs to the pane. */
export interface PlotPlace {
  readonly element: HTMLElement
  /** Writes the reading line: what stands under the cursor, else what the plot says in short. */
  reading(text: string): void
}

/** The table view: few rows, words and numbers as they are read. */
export interface PlotTable {
  readonly caption: string
  readonly head: readonly string[]
  readonly rows: readonly (readonly string[])[]
}

/** Every number drawn, for a CSV file; columns of equal length, NaN where there is none. */
export interface PlotNumbers {
  readonly head: readonly string[]
  readonly columns: readonly ArrayLike<number>[]
}

export interface MountedPlot {
  /** One sentence for those who do not see the plot. */
  summary(): string
  table(): PlotTable
  numbers(): PlotNumbers
  /** The plot as drawn now, on paper. */
  picture(): HTMLCanvasElement
  destroy(): void
}

export type MountPlot = (place: PlotPlace) => MountedPlot
