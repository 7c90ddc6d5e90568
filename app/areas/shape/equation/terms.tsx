// The terms of the difference equation that depend on what the set holds: shapers, filters, the sweep.
import type { ReactNode } from 'react'
import type { ParameterSet, Shaper } from '../../../../src/set/types.ts'
import { Call, Now, Row } from './parts.tsx'

const CURVES: Readonly<Record<Shaper['curve'], string>> = {
  hardClip: 'clip',
  arctan: 'atan',
  tanh: 'tanh',
  cubic: 'cubic',
  diode: 'diode',
  deadZone: 'dead',
  drawn: 'curve',
}

/** ceiling · c(drive · x), factors of 1 left out; what it takes stands alone without a shaper. */
export function shaped(shaper: Shaper | null, inside: ReactNode): ReactNode {
  if (shaper === null) return inside
  const { ceiling, drive, curve } = shaper
  return (
    <mrow>
      {ceiling !== 1 && <Now value={ceiling} />}
      <Call name={CURVES[curve]}>
        {drive !== 1 && <Now value={drive} />}
        {inside}
      </Call>
    </mrow>
  )
}

/** A filter by name around what it takes; only what it takes while the filter is off. */
export function filtered(name: string, hz: number | null, inside: ReactNode): ReactNode {
  return hz === null ? inside : <Call name={name}>{inside}</Call>
}

/** loopShaper(lowCut(damping(q))). */
export function loopChain({ loop }: ParameterSet, read: ReactNode): ReactNode {
  return shaped(loop.shaper, filtered('cut', loop.lowCutHz, filtered('damp', loop.dampingHz, read)))
}

/** wetLowCut(wetHighCut(…)). */
export function wetChain({ mix }: ParameterSet, read: ReactNode): ReactNode {
  return filtered('cut', mix.wetLowCutHz, filtered('damp', mix.wetHighCutHz, read))
}

/** Cycles Φ: rate · n / fs + start + v · spread/(360 V) + c · stereo/360, terms of 0 left out. */
function cycles(set: ParameterSet, voice: boolean, channel: boolean): readonly ReactNode[] {
  const { rateHz, startPhase, stereoPhase } = set.sweep
  const each = set.voices.phaseSpread / (360 * set.voices.count)
  const terms: ReactNode[] = []
  if (rateHz !== 0)
    terms.push(
      <mrow>
        <Now value={rateHz} unit="Hz" />
        <mi>n</mi>
        <mo stretchy="false">/</mo>
        <msub>
          <mi>f</mi>
          <mi>s</mi>
        </msub>
      </mrow>,
    )
  if (startPhase !== 0) terms.push(term(startPhase, null, terms.length === 0))
  if (voice && each !== 0) terms.push(term(each, 'v', terms.length === 0))
  if (channel && stereoPhase !== 0) terms.push(term(stereoPhase / 360, 'c', terms.length === 0))
  return terms
}

function term(value: number, times: string | null, first: boolean): ReactNode {
  return (
    <mrow>
      {(value < 0 || !first) && <mo form={first ? 'prefix' : 'infix'}>{value < 0 ? '−' : '+'}</mo>}
      <Now value={Math.abs(value)} />
      {times && <mi>{times}</mi>}
    </mrow>
  )
}

/** s(Φ): sin(2π · …) or a named shape of the cycles. */
export function sweepShape(set: ParameterSet, voice: boolean, channel: boolean): ReactNode {
  const terms = cycles(set, voice, channel)
  const inside = terms.length === 0 ? <mn>0</mn> : <Row>{terms}</Row>
  if (set.sweep.shape !== 'sine') return <Call name={SHAPES[set.sweep.shape]}>{inside}</Call>
  return (
    <mrow>
      <mi className="cw-eq-function">sin</mi>
      <mo stretchy="false">(</mo>
      <mn>2</mn>
      <mi>π</mi>
      {terms.length > 1 ? (
        <>
          <mo stretchy="false">(</mo>
          {inside}
          <mo stretchy="false">)</mo>
        </>
      ) : (
        <>
          <mo>·</mo>
          {inside}
        </>
      )}
      <mo stretchy="false">)</mo>
    </mrow>
  )
}

const SHAPES: Readonly<Record<Exclude<ParameterSet['sweep']['shape'], 'sine'>, string>> = {
  triangle: 'tri',
  square: 'square',
  rampUp: 'ramp',
  rampDown: '−ramp',
  drift: 'drift',
  drawn: 'drawn',
}
