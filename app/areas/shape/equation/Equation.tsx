// The difference equation of the set as it is, with today's numbers in it: input, line, output, delay.
import './Equation.css'
import type { ReactNode } from 'react'
import type { ParameterSet } from '../../../../src/set/types.ts'
import { useLayout } from '../../../shell/layout.ts'
import { useCurrent } from '../../../state/current.ts'
import { Call, Name, Now, Row, Signal, Signed } from './parts.tsx'
import { loopChain, shaped, sweepShape, wetChain } from './terms.tsx'

interface EquationProps {
  /** Left edge, rem, where it stands beside the loop; else it has the width to itself. */
  readonly besideRem?: number | undefined
}

export function Equation({ besideRem }: EquationProps) {
  const set = useCurrent((s) => s.set)
  const listed = useLayout((s) => s.layout !== 'wide')
  const style = besideRem === undefined ? undefined : { marginLeft: `${besideRem}rem` }
  return (
    <section
      className="cw-equation"
      aria-label="Difference equation"
      data-beside={besideRem !== undefined || undefined}
      style={style}
      tabIndex={listed ? 0 : undefined}
    >
      {hasInput(set) && <InputLine set={set} />}
      <OutputLine set={set} />
      <WriteLine set={set} />
      <DelayLine set={set} />
    </section>
  )
}

interface LineProps {
  readonly set: ParameterSet
}

const hasInput = ({ input }: ParameterSet) => input.gainDb !== 0 || input.shaper !== null
const lineSub = (set: ParameterSet) => (set.layout === 'stereo' ? 'c' : undefined)
const outSub = (set: ParameterSet) => (set.layout === 'mono' ? undefined : 'c')
/** What goes into the line: the input itself, or what gain and shaper make of it. */
const inputName = (set: ParameterSet) => (hasInput(set) ? 'u' : 'x')

/** Voices read at D with their own phase and offset; the loop at the plain one. They differ with more than one voice. */
const manyVoices = (set: ParameterSet) => set.voices.count > 1
const voiceSub = (set: ParameterSet) => (manyVoices(set) ? 'v' : '')

interface LineParts {
  readonly label: string
  readonly children: ReactNode
  /** What may stand on a line of its own where the width is short: browsers break no formula by themselves. */
  readonly more?: readonly ReactNode[]
}

function Line({ label, children, more = [] }: LineParts) {
  return (
    // biome-ignore lint/a11y/useSemanticElements: an equation is no set of form fields.
    <div className="cw-eq" role="group" aria-label={label}>
      {[children, ...more].map((part, i) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: the parts of one equation keep their order.
        <math key={i}>
          <mrow>{part}</mrow>
        </math>
      ))}
    </div>
  )
}

function InputLine({ set }: LineProps) {
  const gain = 10 ** (set.input.gainDb / 20)
  const inside = (
    <mrow>
      {gain !== 1 && <Now value={gain} />}
      <Signal of="x" sub={lineSub(set)} />
    </mrow>
  )
  return (
    <Line label="Input">
      <Signal of="u" sub={lineSub(set)} />
      <mo>=</mo>
      {shaped(set.input.shaper, inside)}
    </Line>
  )
}

function OutputLine({ set }: LineProps) {
  const { mix, sampleRate } = set
  const gain = 10 ** (mix.outputGainDb / 20)
  const dryAgo = Math.floor((mix.dryDelayMs * sampleRate) / 1000 + 0.5)
  const dryOf = mix.dryTap === 'line' ? 'w' : inputName(set)
  const terms: ReactNode[] = []
  if (mix.dry !== 0)
    terms.push(
      <mrow>
        <Signed value={mix.dry} first />
        <Signal of={dryOf} sub={lineSub(set)} ago={dryAgo > 0 ? <Now value={dryAgo} unit="samples" /> : undefined} />
      </mrow>,
    )
  if (mix.wet !== 0)
    terms.push(
      <mrow>
        <Signed value={mix.wet / Math.sqrt(set.voices.count)} first={terms.length === 0} both={mix.invertRight && set.layout !== 'mono'} />
        {wetChain(set, <VoiceSum set={set} />)}
      </mrow>,
    )
  const inside = terms.length === 0 ? <mn>0</mn> : <Row>{terms}</Row>
  const start = (
    <>
      <Signal of="y" sub={outSub(set)} />
      <mo>=</mo>
      {gain !== 1 && <Now value={gain} />}
    </>
  )
  if (set.mix.shaper !== null)
    return (
      <Line label="Output" more={[shaped(set.mix.shaper, inside)]}>
        {start}
      </Line>
    )
  const [first = <mn>0</mn>, ...rest] = terms
  const last = rest.length - 1
  return (
    <Line label="Output" more={gain === 1 ? rest : rest.map((term, i) => (i === last ? closed(term) : term))}>
      {start}
      {gain !== 1 && <mo stretchy="false">(</mo>}
      {gain !== 1 && last < 0 ? closed(first) : first}
    </Line>
  )
}

function closed(term: ReactNode): ReactNode {
  return (
    <>
      {term}
      <mo stretchy="false">)</mo>
    </>
  )
}

function VoiceSum({ set }: LineProps) {
  const sub = `${outSub(set) ?? ''}${voiceSub(set)}`
  return (
    <mrow>
      {manyVoices(set) && (
        <munder>
          <mo>Σ</mo>
          <mi>v</mi>
        </munder>
      )}
      <Signal of="w" sub={lineSub(set)} ago={<DelayName sub={sub} />} />
    </mrow>
  )
}

function DelayName({ sub }: { readonly sub: string }) {
  return (
    <mrow>
      <Name of="D" sub={sub || undefined} />
      <mo stretchy="false">(</mo>
      <mi>n</mi>
      <mo stretchy="false">)</mo>
    </mrow>
  )
}

function WriteLine({ set }: LineProps) {
  const { loop } = set
  const sub = lineSub(set)
  const cross = set.layout === 'stereo' ? loop.crossFeed : 0
  const fedBack: ReactNode[] = []
  if (loop.feedback !== 0 && cross === 0)
    fedBack.push(
      <mrow>
        <Signed value={loop.feedback} />
        <mo form="infix">·</mo>
        <LoopRead set={set} sub={sub} />
      </mrow>,
    )
  if (loop.feedback !== 0 && cross > 0) {
    const over = (
      <mrow>
        <Now value={cross} />
        <LoopRead set={set} sub="1−c" />
        <mo stretchy="false">)</mo>
      </mrow>
    )
    const start = (
      <>
        <Signed value={loop.feedback} />
        <mo stretchy="false">(</mo>
      </>
    )
    if (cross === 1)
      fedBack.push(
        <mrow>
          {start}
          {over}
        </mrow>,
      )
    else
      fedBack.push(
        <mrow>
          {start}
          <Now value={1 - cross} />
          <LoopRead set={set} sub={sub} />
        </mrow>,
        <mrow>
          <mo form="infix">+</mo>
          {over}
        </mrow>,
      )
  }
  return (
    <Line label="Line" more={fedBack}>
      <Signal of="w" sub={sub} />
      <mo>=</mo>
      <Signal of={inputName(set)} sub={sub} />
    </Line>
  )
}

function LoopRead({ set, sub }: LineProps & { readonly sub: string | undefined }) {
  const base = <Now value={(set.line.baseMs * set.sampleRate) / 1000} unit="samples" />
  const moving = <DelayName sub={`${sub ?? ''}${manyVoices(set) ? '0' : ''}`} />
  return loopChain(set, <Signal of="w" sub={sub} ago={set.loop.delay === 'fixed' ? base : moving} />)
}

function DelayLine({ set }: LineProps) {
  const { sweep, line, voices, sampleRate } = set
  const base = (line.baseMs * sampleRate) / 1000
  const spread = manyVoices(set) && voices.spreadMs !== 0
  const depth = sweep.law === 'time' ? (sweep.depthMs * sampleRate) / 1000 : sweep.depthOctaves
  const shape = sweepShape(set, manyVoices(set), set.layout !== 'mono')
  const middle = (
    <mrow>
      <Now value={base} unit="samples" />
      {spread && (
        <>
          <mo>+</mo>
          <Name of="o" sub="v" />
        </>
      )}
    </mrow>
  )
  const unit = <mtext className="cw-eq-unit">samples</mtext>
  const start = (
    <>
      <DelayName sub={`${outSub(set) ?? ''}${voiceSub(set)}`} />
      <mo>=</mo>
    </>
  )
  if (depth === 0)
    return (
      <Line label="Delay">
        {start}
        {middle}
        {unit}
      </Line>
    )
  if (sweep.law === 'time')
    return (
      <Line
        label="Delay"
        more={[
          <mrow key="sweep">
            <mo form="infix">+</mo>
            <Now value={depth} unit="samples" />
            {shape}
          </mrow>,
          unit,
        ]}
      >
        {start}
        {middle}
      </Line>
    )
  return (
    <Line label="Delay" more={[unit]}>
      {start}
      {spread ? <Call name={<mrow />}>{middle}</Call> : middle}
      <mo>·</mo>
      <msup>
        <mn>2</mn>
        <mrow>
          <Now value={depth} />
          {shape}
        </mrow>
      </msup>
    </Line>
  )
}
