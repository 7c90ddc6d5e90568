// Which of three layouts fits: measured in rem, so that a larger text size narrows the page as a smaller window does.
import { create } from 'zustand'

export type Layout = 'wide' | 'medium' | 'narrow'

/** Widths below which three columns, then two, no longer fit; height below which they would not leave the plots room. */
const WIDE_REM = 70
const MEDIUM_REM = 46
const TALL_REM = 34

interface LayoutState {
  readonly layout: Layout
  /** Three columns that fill the window and scroll inside themselves. */
  readonly fits: boolean
}

export function layoutFor(widthPx: number, heightPx: number, remPx: number): LayoutState {
  const width = widthPx / remPx
  const layout = width >= WIDE_REM ? 'wide' : width >= MEDIUM_REM ? 'medium' : 'narrow'
  return { layout, fits: layout === 'wide' && heightPx / remPx >= TALL_REM }
}

const measure = () => layoutFor(innerWidth, innerHeight, Number.parseFloat(getComputedStyle(document.documentElement).fontSize) || 16)

export const useLayout = create<LayoutState>()(() => (typeof document === 'undefined' ? layoutFor(1366, 768, 16) : measure()))

/** Keeps the layout true while window or text size change; returns the way to stop. */
export function watchLayout(): () => void {
  const update = () => {
    const next = measure()
    const now = useLayout.getState()
    if (next.layout !== now.layout || next.fits !== now.fits) useLayout.setState(next)
  }
  // A probe one rem wide: its size changes when only the text size does.
  const probe = document.createElement('div')
  probe.className = 'cw-unseen cw-rem-probe'
  probe.setAttribute('aria-hidden', 'true')
  document.body.append(probe)
  const observer = new ResizeObserver(update)
  observer.observe(probe)
  addEventListener('resize', update)
  update()
  return () => {
    observer.disconnect()
    removeEventListener('resize', update)
    probe.remove()
  }
}
