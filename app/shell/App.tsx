// The frame: top bar over the area. One area for now.
import './App.css'
import { useEffect } from 'react'
import { Shape } from '../areas/shape/Shape.tsx'
import { useCurrent } from '../state/current.ts'
import { Announcer } from './Announcer.tsx'
import { useLayout } from './layout.ts'
import { Messages } from './Messages.tsx'
import { TopBar } from './TopBar.tsx'
import { TransportNarrow } from './transport/Transport.tsx'

export function App() {
  const layout = useLayout((s) => s.layout)
  const fits = useLayout((s) => s.fits)
  const name = useCurrent((s) => s.set.name)
  useEffect(() => {
    document.title = name === '' ? 'Combwright' : `${name} · Combwright`
  }, [name])
  return (
    <div className="cw-app" data-layout={layout} data-fits={fits || undefined}>
      <TopBar />
      <Shape />
      {layout === 'narrow' && (
        <div className="cw-bottombar">
          <TransportNarrow />
        </div>
      )}
      <Messages />
      <Announcer />
    </div>
  )
}
