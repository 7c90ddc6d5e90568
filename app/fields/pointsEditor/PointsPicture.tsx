import { type KeyboardEvent, type MouseEvent, type PointerEvent, useId, useRef, useState } from 'react'
import type { Point } from '../../../src/set/types.ts'
import type { Refusal } from '../binding.ts'
import { FieldNotes } from '../FieldNotes.tsx'
import { sentence } from '../fieldWords.ts'
import { CurvePicture } from './CurvePicture.tsx'
import type { PointsEditorProps } from './PointsEditor.tsx'
import { type Frame, fractionsOf, placeOf } from './pictureFrame.ts'
import { added, type Changed, halfWay, isFixed, moved, quantumOf, removed, straightAt } from './pointMoves.ts'
import { pointWords } from './pointWords.ts'

/** A press farther from every point than this takes hold of none, CSS px. */
const REACH_PX = 16
const COARSE_REACH_PX = 26
/** Of the shown range: an arrow's step, and with Shift. */
const STEP = 0.01
const FINE_STEP = 0.001

interface Drag {
  readonly index: number
  readonly points: readonly Point[]
  readonly frame: Frame
  /** From the pointer to the point, so that it does not jump under the hand. */
  readonly offset: Point
}

/** The picture with its points. One stop for Tab: the chosen point. */
export function PointsPicture(props: PointsEditorProps) {
  const { label, rule, points, closed = false, meaning } = props
  const id = useId()
  const surface = useRef<SVGSVGElement>(null)
  const [chosenBefore, choose] = useState(0)
  const [drag, setDrag] = useState<Drag | null>(null)
  const [under, setUnder] = useState<number | null>(null)
  const [held, setHeld] = useState<string | null>(null)
  const [refusal, setRefusal] = useState<Refusal>(null)
  const keying = useRef(false)
  const chosen = Math.min(chosenBefore, points.length - 1)
  const frame: Frame = drag?.frame ?? { x: props.xRange, y: props.yRange }
  const quanta: Point = [quantumOf(frame.x), quantumOf(frame.y)]
  const words = (point: Point) => pointWords(point, rule, meaning)

  const focusChosen = (index: number) => {
    choose(index)
    requestAnimationFrame(() => surface.current?.querySelector<SVGElement>(`[data-point="${index}"]`)?.focus())
  }
  const tryMove = (from: readonly Point[], index: number, to: Point) => {
    setRefusal(null)
    const next = moved(from, index, to, rule, quanta)
    setHeld(next === points ? null : props.attempt(next))
  }
  const settle = () => {
    setDrag(null)
    keying.current = false
    props.settle()
  }
  const drop = () => {
    setDrag(null)
    setHeld(null)
    keying.current = false
    props.drop()
  }
  const applyChange = (change: Changed) => {
    setHeld(null)
    const refused = change.ok ? props.apply(change.points) : { why: sentence(change.why), ways: [] }
    setRefusal(refused)
    if (change.ok && !refused) focusChosen(change.index)
  }
  const addAt = (at: Point) => applyChange(added(points, at, rule, quanta))
  const addAfter = () => {
    const at = halfWay(points, chosen, rule, closed)
    if (at) addAt([at[0], (props.curveThrough ?? ((x) => straightAt(points, x, rule, closed)))(at[0])])
  }
  const remove = () => applyChange(removed(points, chosen, rule))

  /** The point nearest to the pointer, within reach. */
  const nearest = (event: PointerEvent): number | null => {
    const box = surface.current?.getBoundingClientRect()
    if (!box) return null
    const far = (point: Point) => {
      const [x, y] = fractionsOf(frame, point)
      return Math.hypot(box.left + x * box.width - event.clientX, box.top + y * box.height - event.clientY)
    }
    const [first] = points.map((point, index) => ({ index, far: far(point) })).sort((a, b) => a.far - b.far)
    return first && first.far <= (event.pointerType === 'mouse' ? REACH_PX : COARSE_REACH_PX) ? first.index : null
  }
  const placeUnder = (event: { readonly clientX: number; readonly clientY: number }, within = frame): Point => {
    const box = surface.current?.getBoundingClientRect()
    if (!box) return [0, 0]
    return placeOf(within, [(event.clientX - box.left) / box.width, (event.clientY - box.top) / box.height])
  }

  const onPointerDown = (event: PointerEvent<SVGSVGElement>) => {
    if (event.button !== 0 || !event.isPrimary) return
    const index = nearest(event)
    if (index === null) return
    event.preventDefault()
    const at = points[index] as Point
    const [x, y] = placeUnder(event)
    event.currentTarget.setPointerCapture(event.pointerId)
    focusChosen(index)
    if (!isFixed(index, rule)) setDrag({ index, points, frame, offset: [at[0] - x, at[1] - y] })
  }
  const onPointerMove = (event: PointerEvent<SVGSVGElement>) => {
    if (!drag) {
      setUnder(event.pointerType === 'mouse' ? placeUnder(event)[0] : null)
      return
    }
    const [x, y] = placeUnder(event, drag.frame)
    const to: Point = [within(x + drag.offset[0], drag.frame.x), within(y + drag.offset[1], drag.frame.y)]
    tryMove(drag.points, drag.index, to)
  }
  const onPointerEnd = () => {
    if (drag) settle()
  }
  const onDoubleClick = (event: MouseEvent<SVGSVGElement>) => addAt(placeUnder(event))

  const onKeyDown = (event: KeyboardEvent) => {
    if (event.ctrlKey || event.metaKey || event.altKey) return
    const direction = ARROWS[event.key]
    if (direction) {
      const step = event.shiftKey ? FINE_STEP : STEP
      const [x, y] = points[chosen] as Point
      keying.current = true
      tryMove(points, chosen, [x + direction[0] * step * (frame.x[1] - frame.x[0]), y + direction[1] * step * (frame.y[1] - frame.y[0])])
    } else if (event.key === 'PageDown' || event.key === 'PageUp' || event.key === 'Home' || event.key === 'End') {
      settle()
      focusChosen(pointFrom(chosen, event.key, points.length))
    } else if (event.key === 'Enter') addAfter()
    else if (event.key === 'Delete' || event.key === 'Backspace') remove()
    else if (event.key === 'Escape' && (drag || keying.current)) drop()
    else return
    event.preventDefault()
    setUnder(null)
  }
  const onKeyUp = (event: KeyboardEvent) => {
    if (ARROWS[event.key] && keying.current) settle()
  }

  const at = points[chosen]
  const reading =
    under !== null && !drag
      ? words([under, props.curveThrough?.(under) ?? straightAt(points, under, rule, closed)])
      : at && `${chosen + 1} of ${points.length} · ${words(at)}`
  return (
    <fieldset className="cw-points-frame" aria-label={label} aria-describedby={`${id}-help`}>
      <p className="cw-points-reading">{reading}</p>
      <CurvePicture
        {...props}
        frame={frame}
        chosen={chosen}
        surface={surface}
        describedBy={`${id}-notes`}
        spoken={words}
        onFocusPoint={choose}
        handlers={{
          onPointerDown,
          onPointerMove,
          onPointerUp: onPointerEnd,
          onPointerCancel: onPointerEnd,
          onLostPointerCapture: onPointerEnd,
          onPointerLeave: () => setUnder(null),
          onDoubleClick,
          onKeyDown,
          onKeyUp,
          onBlur: () => {
            if (keying.current) settle()
          },
        }}
      />
      <div className="cw-points-acts">
        <button type="button" className="cw-button" onClick={addAfter}>
          Add a point
        </button>
        <button type="button" className="cw-button" onClick={remove}>
          Remove it
        </button>
      </div>
      <p id={`${id}-help`} hidden>
        Arrows move the chosen point, with Shift finer. Page Up and Page Down choose another, Enter adds one, Delete removes it.
      </p>
      <FieldNotes id={`${id}-notes`} notes={[]} lines={1} refusal={refusal} held={held} />
    </fieldset>
  )
}

const ARROWS: Readonly<Record<string, Point>> = {
  ArrowLeft: [-1, 0],
  ArrowRight: [1, 0],
  ArrowUp: [0, 1],
  ArrowDown: [0, -1],
}

/** The point a key leads to: later ones lie to the right. */
function pointFrom(index: number, key: string, count: number): number {
  if (key === 'Home') return 0
  if (key === 'End') return count - 1
  return (index + (key === 'PageDown' ? 1 : -1) + count) % count
}

const within = (value: number, [low, high]: readonly [number, number]) => Math.max(low, Math.min(high, value))
