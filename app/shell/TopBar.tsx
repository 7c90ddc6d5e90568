// Left half: the set and its history. Right half: what is heard (app/shell/transport).
import './TopBar.css'
import { parameter } from '../../src/set/parameters.ts'
import { useCurrent } from '../state/current.ts'
import { useSaved } from '../state/storage.ts'
import { useView } from '../state/view.ts'
import { AreaTabs } from './AreaTabs.tsx'
import { HistoryButtons } from './HistoryButtons.tsx'
import { useLayout } from './layout.ts'
import { SetMenu } from './SetMenu.tsx'
import { topBarElement } from './topBarElement.ts'
import { Transport } from './transport/Transport.tsx'
import { ViewMenu } from './ViewMenu.tsx'

export function TopBar() {
  const layout = useLayout((s) => s.layout)
  return (
    <header className="cw-topbar" ref={topBarElement}>
      <div className="cw-topbar-set">
        <SetMenu />
        <SetLine />
      </div>
      <AreaTabs />
      <HistoryButtons />
      <ViewMenu />
      {layout !== 'narrow' && <Transport />}
    </header>
  )
}

/** "flanger · 48 kHz · stereo · saved here": opens the fields of the set as a whole. */
function SetLine() {
  const intent = useCurrent((s) => s.set.intent)
  const layout = useCurrent((s) => s.set.layout)
  const sampleRate = useCurrent((s) => s.set.sampleRate)
  const problem = useSaved((s) => s.problem)
  return (
    <button
      type="button"
      className="cw-set-line"
      title="Name, notes, rate and layout"
      onClick={() => useView.setState({ block: 'set', column: 'fields' })}
    >
      {intent} · {sampleRate / 1000} kHz · {optionLabel('layout', layout)} ·{' '}
      {problem === null ? 'saved here' : <span className="cw-set-unsaved">not saved: {problem}</span>}
    </button>
  )
}

function optionLabel(path: string, value: string): string {
  const row = parameter(path)
  return (row.kind === 'choice' && row.options.find((option) => option.value === value)?.label) || value
}
