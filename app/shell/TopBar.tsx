// Left half: the set and its history. Right half: what is heard (app/shell/transport).
import './TopBar.css'
import { useCurrent } from '../state/current.ts'

export function TopBar() {
  const name = useCurrent((s) => s.set.name)
  return (
    <header className="cw-topbar">
      <h1 className="cw-topbar-name">{name}</h1>
    </header>
  )
}
