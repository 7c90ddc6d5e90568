// The knob's end that would hold: one end of one move drawn in as little as serves, each tried over the whole panel again.
import { isListed } from '../analysis/panelKnobs.ts'
import { type PanelSpace, panelSpace } from '../analysis/panelSpace.ts'
import { switchValues } from '../set/panel.ts'
import { moveProblems } from '../set/panelProblems.ts'
import { parameter } from '../set/parameters.ts'
import type { Move, ParameterSet } from '../set/types.ts'
import type { CheckId } from './limits.ts'
import { quantity } from './loopText.ts'
import { SURE } from './panelBoxSure.ts'
import type { Mend, PanelWorst } from './types.ts'

/** Halvings of the way between the end that is too far and the other one, in which the taper's own steps are even. */
const HALVINGS = 14
/** Moves tried for one check, and steps of their searches: where one knob moves against itself a single try takes hundreds. */
const MOST_TRIED = 6
const MOST_STEPS = 1500

interface End {
  readonly k: number
  readonly m: number
  readonly end: 'min' | 'max'
}

/** Ends that make one check hold at every position; none where nothing sure can be said of it, or no single end serves. */
export function* endsThatHold(set: ParameterSet, sampleRate: number, worst: PanelWorst, knobs: readonly number[]): Generator<void, Mend[]> {
  const found: Mend[] = []
  let left = MOST_STEPS
  for (const end of candidates(set, worst, knobs).slice(0, MOST_TRIED)) {
    const steps = drawnIn(set, sampleRate, worst.id, end)
    let step = steps.next()
    for (; !step.done && left > 0; step = steps.next(), left--) yield
    if (step.done && step.value) found.push(step.value)
  }
  return found
}

/** The end a knob stands at where it is worst; both where it is worst in between. */
function candidates({ panel }: ParameterSet, { positions }: PanelWorst, knobs: readonly number[]): End[] {
  return knobs.flatMap((k) =>
    (panel[k]?.moves ?? []).flatMap((move, m): End[] => {
      const t = positions[k] as number
      const value = t <= 0.5 ? 'min' : 'max'
      if (move.min === move.max) return []
      return move.taper !== 'drawn' && (t === 0 || t === 1)
        ? [{ k, m, end: value }]
        : [
            { k, m, end: 'max' },
            { k, m, end: 'min' },
          ]
    }),
  )
}

function* drawnIn(set: ParameterSet, sampleRate: number, id: CheckId, at: End): Generator<void, Mend | null> {
  const sure = SURE[id]
  const move = set.panel[at.k]?.moves[at.m]
  if (!sure || !move) return null
  const holds = (value: Move['min']) => sure(space(set, sampleRate, at, value))
  const value = isListed(move.parameter) ? yield* firstListed(move, at.end, holds) : yield* furthest(move, at.end, holds)
  if (value === null || moveProblems({ ...move, [at.end]: value }, '').length > 0) return null
  const row = parameter(move.parameter)
  const shown = typeof value === 'number' ? quantity(value, 'unit' in row ? row.unit : '') : String(value)
  const path = `panel[${at.k}].moves[${at.m}].${at.end}`
  return { label: `${set.panel[at.k]?.knob}: ${row.label.toLowerCase()} ${at.end === 'max' ? 'up to' : 'from'} ${shown}`, path, value }
}

type Holds = (value: Move['min']) => Generator<void, boolean>

/** The listed value nearest to the end that holds. */
function* firstListed(move: Move, end: 'min' | 'max', holds: Holds): Generator<void, Move['min'] | null> {
  const all = switchValues(parameter(move.parameter)) ?? []
  const [far, near] = end === 'max' ? [move.max, move.min] : [move.min, move.max]
  const step = Math.sign(all.indexOf(near) - all.indexOf(far))
  for (let i = all.indexOf(far) + step; i !== all.indexOf(near) + step; i += step) {
    const value = all[i] as Move['min']
    if (yield* holds(value)) return value
  }
  return null
}

function* furthest(move: Move, end: 'min' | 'max', holds: Holds): Generator<void, number | null> {
  const [far, near] = (end === 'max' ? [move.max, move.min] : [move.min, move.max]) as [number, number]
  if (!(yield* holds(near))) return null
  const whole = parameter(move.parameter).kind === 'integer'
  const at = (t: number): number => (move.taper === 'log' ? near * (far / near) ** t : near + (far - near) * t)
  let [inside, outside] = [0, 1]
  for (let i = 0; i < HALVINGS; i++) {
    const middle = (inside + outside) / 2
    if (yield* holds(whole ? Math.round(at(middle)) : at(middle))) inside = middle
    else outside = middle
  }
  const value = towards(at(inside), near, whole)
  return value !== far && (yield* holds(value)) ? value : null
}

/** Three significant digits, or a whole number, on the side of `near`; `near` itself where that passes it. */
function towards(value: number, near: number, whole: boolean): number {
  const step = whole ? 1 : 10 ** (Math.floor(Math.log10(Math.max(Math.abs(value), Math.abs(near) * 1e-3, 1e-9))) - 2)
  const rounded = Number(((near < value ? Math.floor(value / step + 1e-9) : Math.ceil(value / step - 1e-9)) * step).toPrecision(12))
  return near < value === near < rounded || rounded === near ? rounded : near
}

function space(set: ParameterSet, sampleRate: number, { k, m, end }: End, value: Move['min']): PanelSpace {
  const panel = set.panel.map((knob, i) =>
    i === k ? { ...knob, moves: knob.moves.map((move, j) => (j === m ? { ...move, [end]: value } : move)) } : knob,
  )
  return panelSpace({ ...set, panel }, sampleRate)
}
