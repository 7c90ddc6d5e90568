// What a benchmark is to the runner: a name, and rows of figures with their targets.

export interface Row {
  readonly what: string
  readonly value: number
  readonly unit: string
  /** As design 13 states it; absent for figures that only inform. */
  readonly target?: string
  readonly met?: boolean
  /** How it was measured, for RESULTS.md, where the title does not say enough. */
  readonly how?: string
}

export interface Bench {
  readonly id: string
  readonly title: string
  run(): Promise<Row[]>
}
