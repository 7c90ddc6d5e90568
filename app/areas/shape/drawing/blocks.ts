// The blocks of the signal path: what each is called, what it carries, whether it is there at all.
import { parameter } from '../../../../src/set/parameters.ts'
import type { Interpolation, ParameterSet, Shaper } from '../../../../src/set/types.ts'
import { showIn, showNumber } from '../../../fields/quantity.ts'
import type { BlockId } from '../../../state/view.ts'

/** The panel a chosen block opens. */
export const FIELDS_ID = 'cw-block-fields'

export type PathBlockId = Exclude<BlockId, 'set'>

export interface BlockFace {
  readonly id: PathBlockId
  readonly title: string
  /** Second line; null while the block is not in the path. */
  readonly text: string | null
}

/** In the order of the signal: the path from in to out, then the loop from the sum back to the line. */
export const MAIN_BLOCKS: readonly PathBlockId[] = ['inputShaper', 'line', 'voices', 'wetTone', 'mix', 'outputShaper']
export const LOOP_BLOCKS: readonly PathBlockId[] = ['feedback', 'loopShaper', 'lowCut', 'damping']

export function blockFace(id: PathBlockId, set: ParameterSet): BlockFace {
  const [title, text] = FACES[id](set)
  return { id, title, text }
}

/** The loop is in the path when its gain is not zero. */
export const hasLoop = (set: ParameterSet): boolean => set.loop.feedback !== 0

const FACES: Readonly<Record<PathBlockId, (set: ParameterSet) => readonly [string, string | null]>> = {
  inputShaper: ({ input }) => shaperFace('Input', input.shaper, input.gainDb),
  line: (set) => [set.layout === 'stereo' ? 'Two lines' : 'Line', ''],
  voices: ({ voices, line }) => ['Voices', `${voices.count} · ${interpolationName(line.interpolation)}`],
  wetTone: ({ mix }) => ['Wet tone', bandText(mix.wetLowCutHz, mix.wetHighCutHz)],
  mix: ({ mix }) => ['Mix', `dry ${gain(mix.dry)} wet ${mix.invertRight ? '±' : ''}${gain(mix.wet)}`],
  outputShaper: ({ mix }) => shaperFace('Output', mix.shaper, mix.outputGainDb),
  feedback: ({ loop }) => ['g', loop.feedback === 0 ? null : signed(loop.feedback)],
  loopShaper: ({ loop }) => ['Shaper', shaperText(loop.shaper)],
  lowCut: ({ loop }) => ['Low cut', hertz(loop.lowCutHz)],
  damping: ({ loop }) => ['Damping', hertz(loop.dampingHz)],
}

function shaperFace(where: 'Input' | 'Output', shaper: Shaper | null, gainDb: number): readonly [string, string | null] {
  const gainText = gainDb === 0 ? null : `${gainDb > 0 ? '+' : ''}${showIn(gainDb, 'dB')}`
  if (shaper === null) return gainText === null ? [`${where} shaper`, null] : [`${where} gain`, gainText]
  return [`${where} shaper`, gainText === null ? shaperText(shaper) : `${curveName(shaper)} · ${gainText}`]
}

const shaperText = (shaper: Shaper | null) =>
  shaper && (shaper.drive === 1 ? curveName(shaper) : `${curveName(shaper)} × ${showNumber(shaper.drive, { kind: 'number', unit: '' })}`)

const curveName = ({ curve }: Shaper) => optionLabel('loop.shaper.curve', curve)
export const interpolationName = (kind: Interpolation) => optionLabel('line.interpolation', kind)

function optionLabel(path: string, value: string): string {
  const row = parameter(path)
  return (row.kind === 'choice' && row.options.find((option) => option.value === value)?.label) || value
}

function bandText(lowHz: number | null, highHz: number | null): string | null {
  if (lowHz === null) return highHz === null ? null : `to ${hertz(highHz)}`
  return highHz === null ? `from ${hertz(lowHz)}` : `${hertz(lowHz)} to ${hertz(highHz)}`
}

/** "6.5 kHz", "80 Hz"; null stays null. */
export function hertz<T extends number | null>(hz: T): T extends null ? string | null : string {
  type Text = T extends null ? string | null : string
  if (hz === null) return null as Text
  return (hz >= 1000 ? `${Number((hz / 1000).toPrecision(3))} kHz` : `${Number(hz.toPrecision(3))} Hz`) as Text
}

const gain = (value: number) => showNumber(Number(value.toFixed(2)), { kind: 'number', unit: '' })
const signed = (value: number) => `${value > 0 ? '+' : ''}${gain(value)}`
