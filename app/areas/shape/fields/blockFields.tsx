// The fields each block of the drawing opens.
import type { ReactNode } from 'react'
import { useCurrent } from '../../../state/current.ts'
import type { BlockId } from '../../../state/view.ts'
import { LineFields } from './LineFields.tsx'
import { SetField } from './SetField.tsx'
import { ShaperFields } from './ShaperFields.tsx'

export const BLOCK_TITLES: Readonly<Record<BlockId, string>> = {
  set: 'The set',
  inputShaper: 'Input',
  line: 'Line and sweep',
  voices: 'Voices',
  wetTone: 'Wet tone',
  mix: 'Mix',
  outputShaper: 'Output',
  feedback: 'Loop',
  loopShaper: 'Loop shaper',
  lowCut: 'Loop low cut',
  damping: 'Loop damping',
}

const BLOCK_FIELDS: Readonly<Record<BlockId, () => ReactNode>> = {
  set: SetFields,
  inputShaper: () => (
    <>
      <SetField path="input.gainDb" />
      <ShaperFields owner="input.shaper" />
    </>
  ),
  line: LineFields,
  voices: () => (
    <>
      <SetField path="voices.count" />
      <SetField path="line.interpolation" />
      <SetField path="voices.phaseSpread" lines={1} />
      <SetField path="voices.spreadMs" lines={1} />
    </>
  ),
  wetTone: () => (
    <>
      <SetField path="mix.wetLowCutHz" lines={1} />
      <SetField path="mix.wetHighCutHz" lines={1} />
    </>
  ),
  mix: MixFields,
  outputShaper: () => (
    <>
      <ShaperFields owner="mix.shaper" />
      <SetField path="mix.outputGainDb" />
    </>
  ),
  feedback: LoopFields,
  loopShaper: () => <ShaperFields owner="loop.shaper" />,
  lowCut: () => <SetField path="loop.lowCutHz" lines={1} />,
  damping: () => <SetField path="loop.dampingHz" lines={1} />,
}

export function BlockFields({ block }: { readonly block: BlockId }) {
  const Fields = BLOCK_FIELDS[block]
  return <Fields />
}

function SetFields() {
  return (
    <>
      <SetField path="name" />
      <SetField path="intent" />
      <SetField path="sampleRate" />
      <SetField path="layout" />
      <SetField path="notes" />
    </>
  )
}

function MixFields() {
  const layout = useCurrent((s) => s.set.layout)
  return (
    <>
      <SetField path="mix.dry" />
      <SetField path="mix.wet" />
      <SetField path="mix.dryTap" />
      <SetField path="mix.dryDelayMs" />
      {layout !== 'mono' && <SetField path="mix.invertRight" />}
      <SetField path="mix.outputGainDb" />
    </>
  )
}

function LoopFields() {
  const layout = useCurrent((s) => s.set.layout)
  return (
    <>
      <SetField path="loop.feedback" lines={2} />
      <SetField path="loop.delay" />
      <SetField path="loop.interpolation" />
      {layout === 'stereo' && <SetField path="loop.crossFeed" />}
      <SetField path="loop.dampingHz" lines={1} />
      <SetField path="loop.lowCutHz" lines={1} />
    </>
  )
}
