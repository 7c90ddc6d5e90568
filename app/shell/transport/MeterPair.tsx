// Input and output of the effect: bars with a mark for the held peak, numbers beside them, "over" while the output passes full scale.
// Written by the frame loop, never by React.
import { useEffect, useRef } from 'react'
import { onFrame } from '../../state/frames.ts'
import { live } from '../../state/live.ts'
import { useSession } from '../../state/session.ts'
import { meterText } from './words.ts'

const LOW_DB = -60
const HIGH_DB = 6
/** Numbers are read, bars are seen: numbers change this seldom. */
const NUMBER_MS = 150

const share = (db: number) => Math.min(1, Math.max(0, (db - LOW_DB) / (HIGH_DB - LOW_DB)))

interface Row {
  readonly bar: HTMLElement
  readonly hold: HTMLElement
  readonly number: HTMLElement
}

function rowsOf(root: HTMLElement): readonly [Row, Row] {
  const all = (name: string) => root.querySelectorAll<HTMLElement>(`.cw-meter-${name}`)
  const row = (i: number): Row => ({ bar: all('bar')[i]!, hold: all('hold')[i]!, number: all('number')[i]! })
  return [row(0), row(1)]
}

function draw(row: Row, peaks: readonly number[], holds: readonly number[], withNumber: boolean): void {
  const hold = Math.max(...holds)
  row.bar.style.transform = `scaleX(${share(Math.max(...peaks))})`
  row.hold.style.transform = `translateX(${share(hold) * 100}%)`
  row.hold.style.visibility = hold > LOW_DB ? 'visible' : 'hidden'
  if (withNumber) row.number.textContent = meterText(hold)
}

export function MeterPair() {
  const root = useRef<HTMLDivElement>(null)
  const playing = useSession((s) => s.playing)
  useEffect(() => {
    const element = root.current
    if (!element) return
    const [input, output] = rowsOf(element)
    const unit = element.querySelector<HTMLElement>('.cw-meter-unit')!
    let numbersMs = Number.NEGATIVE_INFINITY
    let over = false
    const drawAll = (timeMs: number) => {
      const withNumbers = timeMs - numbersMs >= NUMBER_MS
      if (withNumbers) numbersMs = timeMs
      draw(input, live.inPeakDb, live.inHoldDb, withNumbers)
      draw(output, live.outPeakDb, live.outHoldDb, withNumbers)
      if (over === live.overload) return
      over = live.overload
      unit.textContent = over ? 'over' : 'dBFS'
      unit.toggleAttribute('data-over', over)
    }
    const stop = onFrame(drawAll)
    if (playing) return stop
    // The bars fall once more after Pause, then the frame loop may sleep.
    const timer = setTimeout(stop, 1000)
    return () => {
      clearTimeout(timer)
      stop()
    }
  }, [playing])
  return (
    <div className="cw-meters" ref={root}>
      <span className="cw-unseen">Levels into and out of the effect, before the listening level:</span>
      <div className="cw-meter-bars" aria-hidden="true">
        {['in', 'out'].map((side) => (
          <span key={side} className="cw-meter-track">
            <span className="cw-meter-bar" />
            <span className="cw-meter-hold" />
          </span>
        ))}
      </div>
      <div className="cw-meter-texts">
        <span>
          <span>in </span>
          <span className="cw-meter-number">−∞</span>
        </span>
        <span>
          <span>out </span>
          <span className="cw-meter-number">−∞</span> <span className="cw-meter-unit">dBFS</span>
        </span>
      </div>
    </div>
  )
}
