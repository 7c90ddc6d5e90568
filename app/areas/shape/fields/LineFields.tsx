// Base, depth and rate lead; the brief's own quantities (first notch, first peak, width in cents) stand with them.
import { useCurrent } from '../../../state/current.ts'
import { DrawnSweep } from './DrawnSweep.tsx'
import { ExtremeField } from './ExtremeField.tsx'
import { SetField } from './SetField.tsx'
import { TempoField } from './TempoField.tsx'
import { WidthField } from './WidthField.tsx'

export function LineFields() {
  const law = useCurrent((s) => s.set.sweep.law)
  const layout = useCurrent((s) => s.set.layout)
  const shape = useCurrent((s) => s.set.sweep.shape)
  return (
    <>
      <ExtremeField kind="notch" />
      <ExtremeField kind="peak" />
      <SetField path="line.baseMs" lines={1} />
      <SetField path={law === 'time' ? 'sweep.depthMs' : 'sweep.depthOctaves'} lines={1} />
      <WidthField />
      <SetField path="sweep.rateHz" lines={1} />
      <TempoField />
      <SetField path="sweep.shape" />
      {shape === 'drawn' && <DrawnSweep />}
      {shape === 'drift' && <SetField path="sweep.seed" />}
      {(shape === 'square' || shape === 'rampUp' || shape === 'rampDown') && <SetField path="sweep.edgeMs" lines={1} />}
      <SetField path="sweep.law" />
      <SetField path="sweep.startPhase" />
      {layout !== 'mono' && <SetField path="sweep.stereoPhase" lines={1} />}
      <SetField path="sweep.updateEvery" lines={1} />
      <SetField path="sweep.between" />
    </>
  )
}
