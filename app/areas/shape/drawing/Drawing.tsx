// The signal path as it is, and the control over it: choosing a block opens its fields. One tab stop; arrows move inside.
import './Drawing.css'
import { useLayoutEffect, useRef, useState } from 'react'
import { useCurrent } from '../../../state/current.ts'
import { useView } from '../../../state/view.ts'
import { Equation } from '../equation/Equation.tsx'
import { BlockTab } from './BlockTab.tsx'
import { interpolationName, LOOP_BLOCKS, MAIN_BLOCKS } from './blocks.ts'
import { geometryOf, right, TIGHT_WIDTH } from './geometry.ts'
import { neighbour } from './roving.ts'
import { Wires } from './Wires.tsx'

export function Drawing() {
  const set = useCurrent((s) => s.set)
  const block = useView((s) => s.block)
  const inColumn = useView((s) => s.column === 'fields')
  const [frame, width] = useWidthRem()
  const geometry = geometryOf(set, width)
  const besideRem = geometry.labels.loopReads.x + (set.loop.delay === 'fixed' ? LONG_WORDS_REM : LOOP_WORDS_REM)
  const stop = block === 'set' ? 'line' : block
  const style = { width: `${geometry.width}rem`, height: `${geometry.height}rem` }
  return (
    <div className="cw-drawing" ref={frame}>
      <div
        className="cw-drawing-sheet"
        role="tablist"
        aria-label="Signal path"
        style={style}
        onKeyDown={(event) => {
          const next = neighbour(stop, event.key)
          if (!next) return
          event.preventDefault()
          useView.setState({ block: next, column: 'fields' })
          document.getElementById(`cw-block-${next}`)?.focus()
        }}
      >
        <Wires geometry={geometry} crossFeed={set.loop.feedback === 0 ? 0 : set.loop.crossFeed} />
        <Labels set={set} geometry={geometry} />
        {[...MAIN_BLOCKS, ...LOOP_BLOCKS].map((id) => (
          <BlockTab key={id} id={id} set={set} box={geometry.boxes[id]} chosen={inColumn && id === block} isStop={id === stop} />
        ))}
      </div>
      <Equation besideRem={geometry.width - besideRem < EQUATION_REM ? undefined : besideRem} />
    </div>
  )
}

/** Room the equation needs beside the loop, and the words at the loop's tap, rem. */
const EQUATION_REM = 27
const LOOP_WORDS_REM = 7.5
const LONG_WORDS_REM = 10

type LabelsProps = { readonly set: Parameters<typeof geometryOf>[0]; readonly geometry: ReturnType<typeof geometryOf> }

function Labels({ set, geometry }: LabelsProps) {
  const { labels, cross } = geometry
  const at = ({ x, y }: { readonly x: number; readonly y: number }) => ({ left: `${x}rem`, top: `${y}rem` })
  const { loop, mix } = set
  const dry = mix.dry === 0 ? 'no dry' : mix.dryDelayMs > 0 ? `dry, ${mix.dryDelayMs} ms late` : 'dry'
  const reads = `loop reads ${interpolationName(loop.interpolation)}${loop.delay === 'fixed' ? ' at base' : ''}`
  return (
    <div aria-hidden="true">
      <span className="cw-drawing-end" style={at(labels.in)}>
        in
      </span>
      <span className="cw-drawing-end" style={at(labels.out)}>
        out
      </span>
      <span className="cw-drawing-label" style={at(labels.dry)}>
        {dry}
      </span>
      <span className="cw-drawing-label" style={at(labels.loopReads)}>
        {loop.feedback === 0 ? 'no loop' : reads}
      </span>
      <span className="cw-drawing-sum" style={at(geometry.sum)}>
        +
      </span>
      {cross && loop.crossFeed > 0 && (
        <span className="cw-drawing-label cw-drawing-label--left" style={at({ x: right(cross) + 0.25, y: cross.y + 1.375 })}>
          cross {Number(loop.crossFeed.toFixed(2))}
        </span>
      )}
    </div>
  )
}

/** Inner width of the frame in rem, followed as it changes. */
function useWidthRem() {
  const frame = useRef<HTMLDivElement>(null)
  const [width, setWidth] = useState(TIGHT_WIDTH)
  useLayoutEffect(() => {
    const element = frame.current
    if (!element) return
    const measure = () => {
      const rem = Number.parseFloat(getComputedStyle(document.documentElement).fontSize) || 16
      setWidth(Math.floor((element.clientWidth / rem) * 16) / 16)
    }
    measure()
    const observer = new ResizeObserver(measure)
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  return [frame, width] as const
}
