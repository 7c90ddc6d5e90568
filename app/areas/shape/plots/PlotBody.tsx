// The place a plot is drawn in. The plot lives outside React: made when the place appears, destroyed when it goes.
import { useCallback, useId, useRef } from 'react'
import { plotEntry } from '../../../plots/plotList.ts'
import type { MountedPlot } from '../../../plots/plotTypes.ts'
import { loadOrSay } from '../../../shell/usePopup.ts'
import { everySecond } from '../../../state/frames.ts'
import type { PlotId } from '../../../state/view.ts'

const FETCH_FAILED = 'not fetched: choose another plot, then this one again'

interface PlotBodyProps {
  readonly id: PlotId
  readonly label: string
  readonly reading: HTMLElement
  /** Its table stands in front of it. */
  readonly hidden: boolean
  onMounted(mounted: MountedPlot | null): void
}

export function PlotBody({ id, label, reading, hidden, onMounted }: PlotBodyProps) {
  const summaryId = useId()
  const summary = useRef<HTMLParagraphElement>(null)
  const mount = useCallback(
    (element: HTMLElement | null) => {
      if (!element) return
      let leave: (() => void) | null = () => {}
      void loadOrSay(plotEntry(id).load).then((mountPlot) => {
        // Another plot was chosen meanwhile.
        if (leave === null) return
        if (mountPlot === null) write(reading, FETCH_FAILED)
        else leave = put(mountPlot({ element, reading: (text) => write(reading, text) }))
      })
      const put = (mounted: MountedPlot) => {
        const stop = everySecond(() => {
          if (summary.current) write(summary.current, mounted.summary())
        })
        onMounted(mounted)
        return () => {
          stop()
          onMounted(null)
          mounted.destroy()
        }
      }
      return () => {
        leave?.()
        leave = null
        write(reading, '')
      }
    },
    [id, reading, onMounted],
  )
  return (
    <figure className="cw-plot-figure" aria-label={label} aria-describedby={summaryId} inert={hidden}>
      <div className="cw-plot" ref={mount} />
      <p className="cw-unseen" id={summaryId} ref={summary} />
    </figure>
  )
}

function write(element: HTMLElement, text: string): void {
  if (element.textContent !== text) element.textContent = text
}
