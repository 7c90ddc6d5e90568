// What panel.box knows of each check: where it is worst, and how well that is known. Places are judged by the checks themselves; bounds come from panelDirections.ts.
import type { PanelFind } from '../analysis/panelSearch.ts'
import { type PanelSpace, setAt } from '../analysis/panelSpace.ts'
import { closedFigure } from './closedFigures.ts'
import type { CheckEntry, CheckInput, CheckMaterial, CheckValue, Figure, PanelWorst, Status } from './types.ts'

export type Positions = readonly number[]

export interface PanelFinding {
  readonly positions: Positions
  readonly by: PanelWorst['by']
  /** What no position passes, where the place found need not be the worst. null: nothing is known of what was not tried. */
  readonly bound?: { readonly value: CheckValue; readonly status: Status } | null
  /** Knobs that concern the check. */
  readonly knobs: readonly number[]
  /** Sets looked at. */
  readonly looks: number
  /** The argument, for the working. */
  readonly formula: string
  readonly source: string
}

/** Gives way between looks. */
export type PanelJudge = (look: PanelLook, entry: CheckEntry) => Generator<void, PanelFinding>

/** The panel under judgement; checks of one place share what they compute. */
export interface PanelLook {
  readonly space: PanelSpace
  readonly inputAt: (positions: Positions) => CheckInput
  readonly figureAt: (entry: CheckEntry, positions: Positions) => Figure
}

export function panelLook(space: PanelSpace, material?: CheckMaterial): PanelLook {
  const inputs = new Map<string, CheckInput>()
  const inputAt = (positions: Positions): CheckInput => {
    const key = positions.join()
    const known = inputs.get(key)
    if (known) return known
    const input = { set: setAt(space, positions), sampleRate: space.sampleRate, ...(material && { material }) }
    inputs.set(key, input)
    return input
  }
  return { space, inputAt, figureAt: (entry, positions) => closedFigure(entry, inputAt(positions)) }
}

const RANK: Readonly<Record<Status, number>> = { holds: 0, note: 1, near: 2, fails: 3 }

export const rankOf = (status: Status): number => RANK[status]

/** The finding whose figure is larger. */
export const worseFind = (a: PanelFind, b: PanelFind): PanelFind => (b.value > a.value ? b : a)

/** Several searches of sides of one figure as one: the worst place, the weakest knowledge, all knobs. */
export function oneFind(finds: readonly PanelFind[]): PanelFind {
  const worst = finds.reduce(worseFind)
  const weakest = (['samples', 'intervals', 'corners'] as const).find((by) => finds.some((find) => find.by === by)) ?? 'corners'
  const knobs = [...new Set(finds.flatMap((find) => find.knobs))].sort((a, b) => a - b)
  const places = finds.flatMap((find) => find.places).sort((a, b) => b.value - a.value)
  return {
    ...worst,
    by: weakest,
    bound: Math.max(...finds.map((find) => find.bound)),
    looks: finds.reduce((sum, find) => sum + find.looks, 0),
    knobs,
    places,
  }
}
