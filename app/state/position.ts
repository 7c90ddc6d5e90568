// The sweep position everything on the page shows: the held one, else the one being heard (or heard last), else where it rests.
import { currentSet } from './current.ts'
import { live } from './live.ts'
import { useView } from './view.ts'

export function shownPosition(): number {
  const { held } = useView.getState()
  if (held !== null) return held
  return live.heard ? live.position() : currentSet().sweep.startPhase
}

/** Holds the sweep at a position, wrapped to [0, 1); null lets it run again. */
export function holdAt(position: number | null): void {
  useView.setState({ held: position === null ? null : position - Math.floor(position) })
}
