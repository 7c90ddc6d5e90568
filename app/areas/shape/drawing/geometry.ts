// Where blocks, wires and marks of the signal path stand: pure numbers for a width in rem. Dimensions run between a tight and a
// roomy size; what is left over goes to the line.
//
//        dry ─────────────────────────────────────────────────┐
//  in ─▶ [input shaper] ─●─▶(+)─●─▶ [      line      ] ─▶ [voices] ─▶ [wet tone] ─▶ [mix] ─▶ [output shaper] ─▶ out
//                            ▲                     ●
//                            └ [X] [g] [shaper] [low cut] [damping] ┘
import type { ParameterSet } from '../../../../src/set/types.ts'
import type { PathBlockId } from './blocks.ts'

export interface Box {
  readonly x: number
  readonly y: number
  readonly width: number
  readonly height: number
}

export interface Wire {
  /** SVG path in rem. */
  readonly path: string
  /** Two signals side by side. */
  readonly double: boolean
  /** Nothing flows: drawn dashed. */
  readonly idle: boolean
  readonly arrow: boolean
}

export interface Geometry {
  readonly width: number
  readonly height: number
  readonly boxes: Readonly<Record<PathBlockId, Box>>
  readonly sum: { readonly x: number; readonly y: number; readonly r: number }
  readonly wires: readonly Wire[]
  /** Where one wire leaves another. */
  readonly dots: readonly { readonly x: number; readonly y: number }[]
  /** Box of the two loops' crossing; null where none goes over to the other. */
  readonly cross: Box | null
  readonly labels: Readonly<Record<'in' | 'out' | 'dry' | 'loopReads', { readonly x: number; readonly y: number }>>
}

const DRY_Y = 1.125
const MAIN_Y = 2.875
const MAIN_HALF = 1.25
const LOOP_Y = 6.375
const LOOP_HALF = 1.125
const SUM_R = 0.625
const HEIGHT = 7.75

const TIGHT = {
  in: 1.75,
  gap: 0.75,
  tap: 0.75,
  shaper: 5.125,
  line: 19,
  voices: 6,
  tone: 5,
  mix: 7,
  g: 3,
  loopShaper: 4.25,
  cut: 4,
  damping: 4.5,
  loopGap: 0.5,
  cross: 1.75,
}
const ROOMY = {
  in: 1.75,
  gap: 1.5,
  tap: 1.5,
  shaper: 6.75,
  line: 19.5,
  voices: 7.75,
  tone: 6.5,
  mix: 9,
  g: 3.5,
  loopShaper: 5.25,
  cut: 4.25,
  damping: 5.75,
  loopGap: 0.75,
  cross: 2.25,
}
type Sizes = typeof TIGHT

/** Smallest width, rem, the drawing stands in. */
export const TIGHT_WIDTH = widthOf(TIGHT)

function widthOf(d: Sizes): number {
  return 2 * d.in + 8 * d.gap + 2 * d.tap + 2 * SUM_R + 2 * d.shaper + d.line + d.voices + d.tone + d.mix
}

function sizesFor(width: number): Sizes {
  const roomy = widthOf(ROOMY)
  const t = Math.max(0, Math.min(1, (width - TIGHT_WIDTH) / (roomy - TIGHT_WIDTH)))
  const mixed = Object.fromEntries(
    (Object.keys(TIGHT) as (keyof Sizes)[]).map((key) => [key, TIGHT[key] + t * (ROOMY[key] - TIGHT[key])]),
  ) as Sizes
  return { ...mixed, line: mixed.line + Math.max(0, width - roomy) }
}

/** The drawing of a set, `width` rem wide. */
export function geometryOf(set: ParameterSet, width: number): Geometry {
  const d = sizesFor(Math.max(width, TIGHT_WIDTH))
  const main = (x: number, w: number): Box => ({ x, y: MAIN_Y - MAIN_HALF, width: w, height: 2 * MAIN_HALF })
  const inputShaper = main(d.in + d.gap, d.shaper)
  const inputTap = right(inputShaper) + d.tap
  const sumX = inputTap + d.gap + SUM_R
  const lineTap = sumX + SUM_R + d.tap
  const line = main(lineTap + d.gap, d.line)
  const voices = main(right(line) + d.gap, d.voices)
  const wetTone = main(right(voices) + d.gap, d.tone)
  const mix = main(right(wetTone) + d.gap, d.mix)
  const outputShaper = main(right(mix) + d.gap, d.shaper)
  const end = right(outputShaper) + d.gap

  const loop = (x: number, w: number): Box => ({ x, y: LOOP_Y - LOOP_HALF, width: w, height: 2 * LOOP_HALF })
  const stereo = set.layout === 'stereo'
  const cross: Box = { x: sumX + d.loopGap, y: LOOP_Y - 0.3, width: d.cross, height: 0.6 }
  const feedback = loop(stereo ? right(cross) + d.loopGap / 2 : sumX + 2 * d.loopGap, d.g)
  const loopShaper = loop(right(feedback) + d.loopGap, d.loopShaper)
  const lowCut = loop(right(loopShaper) + d.loopGap, d.cut)
  const damping = loop(right(lowCut) + d.loopGap, d.damping)
  const loopTapX = Math.min(right(line) - 1, Math.max(right(damping) + d.loopGap, line.x + line.width * 0.9))

  const boxes = { inputShaper, line, voices, wetTone, mix, outputShaper, feedback, loopShaper, lowCut, damping }
  const points: Points = { inX: d.in, inputTap, sumX, lineTap, loopTapX, end, cross: stereo && set.loop.crossFeed > 0 ? cross : null }
  const dryFrom = set.mix.dryTap === 'input' ? inputTap : lineTap
  return {
    width: end + d.in,
    height: HEIGHT,
    boxes,
    sum: { x: sumX, y: MAIN_Y, r: SUM_R },
    wires: wiresOf(set, boxes, points),
    dots: [
      { x: dryFrom, y: MAIN_Y },
      { x: loopTapX, y: MAIN_Y + MAIN_HALF },
    ],
    cross: points.cross,
    labels: {
      in: { x: 0, y: MAIN_Y },
      out: { x: end + 0.25, y: MAIN_Y },
      dry: { x: dryFrom, y: DRY_Y - 0.625 },
      loopReads: { x: loopTapX + 0.5, y: MAIN_Y + MAIN_HALF + 0.875 },
    },
  }
}

interface Points {
  readonly inX: number
  readonly inputTap: number
  readonly sumX: number
  readonly lineTap: number
  readonly loopTapX: number
  readonly end: number
  readonly cross: Box | null
}

function wiresOf(set: ParameterSet, boxes: Geometry['boxes'], p: Points): readonly Wire[] {
  const two = set.layout === 'stereo'
  const twoOut = set.layout !== 'mono'
  const noLoop = set.loop.feedback === 0
  const noDry = set.mix.dry === 0
  const noWet = set.mix.wet === 0
  const along = (x0: number, x1: number, double: boolean, idle = false, arrow = true): Wire => ({
    path: `M${x0} ${MAIN_Y}H${x1}`,
    double,
    idle,
    arrow,
  })
  const back = (x0: number, x1: number): Wire => ({ path: `M${x0} ${LOOP_Y}H${x1}`, double: two, idle: noLoop, arrow: false })
  const { inputShaper, line, voices, wetTone, mix, outputShaper, feedback, loopShaper, lowCut, damping } = boxes
  const dryFrom = set.mix.dryTap === 'input' ? p.inputTap : p.lineTap
  const dryTo = mix.x + mix.width / 3
  const loopEnd = p.cross ? p.cross.x : p.sumX
  return [
    along(p.inX + 0.5, inputShaper.x, two),
    along(right(inputShaper), p.sumX - SUM_R, two),
    along(p.sumX + SUM_R, line.x, two),
    along(right(line), voices.x, two, noWet),
    along(right(voices), wetTone.x, twoOut, noWet),
    along(right(wetTone), mix.x, twoOut, noWet),
    along(right(mix), outputShaper.x, twoOut),
    along(right(outputShaper), p.end, twoOut),
    { path: `M${dryFrom} ${MAIN_Y}V${DRY_Y}H${dryTo}V${mix.y}`, double: two, idle: noDry, arrow: true },
    { path: `M${p.loopTapX} ${MAIN_Y + MAIN_HALF}V${LOOP_Y}H${right(damping)}`, double: two, idle: noLoop, arrow: false },
    back(damping.x, right(lowCut)),
    back(lowCut.x, right(loopShaper)),
    back(loopShaper.x, right(feedback)),
    ...(p.cross ? [back(feedback.x, right(p.cross))] : []),
    { path: `M${p.cross ? loopEnd : feedback.x} ${LOOP_Y}H${p.sumX}V${MAIN_Y + SUM_R}`, double: two, idle: noLoop, arrow: true },
  ]
}

export const right = (box: Box): number => box.x + box.width
