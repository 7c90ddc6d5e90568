// The drawn curve with its grid and its points, as SVG: lines in fractions of the picture, points and numbers at their own size.
import type { RefObject, SVGAttributes } from 'react'
import type { Point } from '../../../src/set/types.ts'
import type { PointsEditorProps } from './PointsEditor.tsx'
import { type Frame, fractionsOf } from './pictureFrame.ts'
import { corners, isFixed } from './pointMoves.ts'
import { short } from './pointWords.ts'

interface CurvePictureProps extends PointsEditorProps {
  readonly frame: Frame
  readonly chosen: number
  readonly surface: RefObject<SVGSVGElement | null>
  readonly handlers: SVGAttributes<SVGSVGElement>
  readonly describedBy: string
  readonly spoken: (point: Point) => string
  readonly onFocusPoint: (index: number) => void
}

const SAMPLES = 160

export function CurvePicture(props: CurvePictureProps) {
  const { rule, points, closed = false, frame, chosen, curveThrough, compare } = props
  const { xTicks = threeOf(frame.x), yTicks = threeOf(frame.y) } = props
  const line = curveThrough ? sampled(curveThrough, frame) : corners(points, frame.x, rule, closed)
  return (
    <div className="cw-points-picture">
      <svg className="cw-points-surface" ref={props.surface} role="none" {...props.handlers}>
        <rect className="cw-points-ground" width="100%" height="100%" />
        {xTicks.map((x) => {
          const at = percent(fractionsOf(frame, [x, 0])[0])
          return <line key={x} className="cw-points-grid" x1={at} x2={at} y1="0" y2="100%" />
        })}
        {yTicks.map((y) => {
          const at = percent(fractionsOf(frame, [0, y])[1])
          return <line key={y} className="cw-points-grid" x1="0" x2="100%" y1={at} y2={at} />
        })}
        <svg className="cw-points-lines" viewBox="0 0 1 1" preserveAspectRatio="none" aria-hidden="true">
          {compare && <polyline className="cw-points-compare" points={pathOf(sampled(compare, frame), frame)} />}
          <polyline className="cw-points-line" points={pathOf(line, frame)} />
        </svg>
        {points.map((point, index) => (
          <PointMark
            // biome-ignore lint/suspicious/noArrayIndexKey: a point has no name but its place in the row
            key={index}
            point={point}
            index={index}
            {...props}
            isChosen={index === chosen}
          />
        ))}
      </svg>
      {yTicks.map((y) => (
        <span key={y} className="cw-points-tick cw-points-tick--y" style={{ top: percent(fractionsOf(frame, [0, y])[1]) }}>
          {short(y)}
        </span>
      ))}
      {xTicks.map((x) => (
        <span key={x} className="cw-points-tick cw-points-tick--x" style={{ left: percent(fractionsOf(frame, [x, 0])[0]) }}>
          {short(x)}
        </span>
      ))}
    </div>
  )
}

interface PointMarkProps extends CurvePictureProps {
  readonly point: Point
  readonly index: number
  readonly isChosen: boolean
}

function PointMark({ point, index, points, rule, frame, isChosen, describedBy, spoken, onFocusPoint }: PointMarkProps) {
  const [across, down] = fractionsOf(frame, point)
  const [cx, cy] = [percent(across), percent(down)]
  return (
    <g
      className="cw-points-mark"
      data-point={index}
      data-chosen={isChosen || undefined}
      data-fixed={isFixed(index, rule) || undefined}
      role="slider"
      tabIndex={isChosen ? 0 : -1}
      aria-label={`Point ${index + 1} of ${points.length}`}
      aria-valuenow={point[1]}
      aria-valuemin={rule.yMin}
      aria-valuemax={rule.yMax}
      aria-valuetext={spoken(point)}
      aria-readonly={isFixed(index, rule) || undefined}
      aria-describedby={describedBy}
      onFocus={() => onFocusPoint(index)}
    >
      <circle className="cw-points-reach" cx={cx} cy={cy} />
      <circle className="cw-points-focus" cx={cx} cy={cy} />
      <circle className="cw-points-dot" cx={cx} cy={cy} />
    </g>
  )
}

const percent = (part: number) => `${(100 * part).toFixed(3)}%`
const threeOf = ([low, high]: readonly [number, number]) => [low, (low + high) / 2, high]

function sampled(curve: (x: number) => number, { x: [low, high] }: Frame): Point[] {
  return Array.from({ length: SAMPLES + 1 }, (_, i) => {
    const x = low + (i / SAMPLES) * (high - low)
    return [x, curve(x)] as const
  })
}

const pathOf = (line: readonly Point[], frame: Frame) =>
  line.map((point) => fractionsOf(frame, point).map((part) => part.toFixed(5))).join(' ')
