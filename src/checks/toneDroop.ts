// tone.droop: the treble that the interpolated reads lose at worst. A note: dull, but not wrong.
import { type Droop, droop, type ReadDroop } from '../analysis/droop.ts'
import { withAt } from '../set/path.ts'
import type { ParameterSet } from '../set/types.ts'
import { setProblems } from '../set/validity.ts'
import { labelOf } from './limits.ts'
import { quantity } from './loopText.ts'
import { samplesText } from './sweepText.ts'
import type { Check, CheckFunction, Mend, WorkingStep } from './types.ts'

/** Less is not worth an offer, dB. */
const WORTH_DB = 0.1

export const toneDroop: CheckFunction = ({ set, sampleRate }): Check => {
  const found = droop(set, sampleRate)
  const reads = readsOf(found)
  const worst = reads.reduce((a, b) => (b.lossDb > a.lossDb ? b : a))
  const at = `${quantity(found.frequencyHz / 1000, 'kHz')}`
  const mend = mends(set, sampleRate, found)
  return {
    id: 'tone.droop',
    status: worst.lossDb > 0 ? 'note' : 'holds',
    value: worst.lossDb,
    limit: null,
    unit: 'dB',
    label: labelOf('tone.droop'),
    text:
      worst.lossDb > 0
        ? `At ${at} ${worst.name} loses up to ${quantity(worst.lossDb, 'dB')} by interpolating${worst.again}.`
        : `The reads lose nothing at ${at} by interpolating.`,
    working: reads.map((read) => stepOf(read, found.frequencyHz, sampleRate)),
    ...(mend.length > 0 && { mend }),
  }
}

interface NamedDroop extends ReadDroop {
  readonly name: string
  readonly again: string
}

function readsOf({ voices, loop }: Droop): NamedDroop[] {
  const named = (read: ReadDroop, owner: string, again: string): NamedDroop => ({ ...read, name: `${owner} ${read.kind} read`, again })
  return [named(voices, 'the voices’', ''), ...(loop ? [named(loop, 'the loop’s', ', once more each pass')] : [])]
}

const FORMULAS: Readonly<Record<ReadDroop['kind'], string>> = {
  nearest: '|A| = 1: a whole sample is read as it is',
  linear: '−20 log₁₀|1 − f + f e^(−jω)|, at f = ½ −20 log₁₀ cos(ω/2)',
  lagrange3: '−20 log₁₀|Σ h_k(f) e^(−jkω)|, h the third-order Lagrange taps',
  hermite4: '−20 log₁₀|Σ h_k(f) e^(−jkω)|, h the Catmull-Rom taps',
  allpass1: '|A| = 1: an all-pass shifts phases only',
}
const SOURCES: Readonly<Record<ReadDroop['kind'], string>> = {
  nearest: 'exact',
  linear: 'J. O. Smith, PASP, "Linear Interpolation"',
  lagrange3: 'Laakso, Välimäki, Karjalainen, Laine, "Splitting the Unit Delay", 1996',
  hermite4: 'Niemitalo 2001, "4-point, 3rd-order Hermite"',
  allpass1: 'J. O. Smith, PASP, "First-Order Allpass Interpolation"',
}

function stepOf({ name, kind, lossDb, delaySamples, fractions: [low, high] }: NamedDroop, hz: number, sampleRate: number): WorkingStep {
  const reach =
    low === high ? `f = ${quantity(low)}` : low === 0 && high === 1 ? 'every f is reached' : `f from ${quantity(low)} to ${quantity(high)}`
  const where = lossDb > 0 ? `, worst at ${samplesText(delaySamples)}` : ''
  return {
    formula: FORMULAS[kind],
    numbers: `${name}, ω = 2π ${quantity(hz, 'Hz')}/${quantity(sampleRate, 'Hz')}; ${reach}${where}`,
    result: `${quantity(lossDb, 'dB')} lost`,
    source: SOURCES[kind],
  }
}

/** The four points that lose least, for the voices. Not for the loop: there a cubic read costs the proof of stability more than treble is worth. */
function mends(set: ParameterSet, sampleRate: number, found: Droop): Mend[] {
  const path = 'line.interpolation'
  const changed = withAt(set, path, 'lagrange3')
  const after = droop(changed, sampleRate).voices.lossDb
  if (found.voices.lossDb - after < WORTH_DB || setProblems(changed, sampleRate).length > 0) return []
  return [{ label: `Line read lagrange3 (${quantity(after, 'dB')} lost)`, path, value: 'lagrange3' }]
}
