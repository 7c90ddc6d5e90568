// Entry: what was kept is read before the first paint, then the frame is drawn. Stores are made once, outside React.
import { CSPProvider } from '@base-ui/react/csp-provider'
import { StrictMode } from 'react'
import { createRoot, type Root } from 'react-dom/client'
import './styles/tokens.css'
import './styles/base.css'
import './styles/dialog.css'
import { mute } from './audio/audition.ts'
import { App } from './shell/App.tsx'
import { watchDrops } from './shell/drop.ts'
import { watchKeys } from './shell/keys.ts'
import { watchLayout } from './shell/layout.ts'
import { say } from './shell/messages.ts'
import { prepareSaving } from './shell/setFiles.ts'
import { keptTheme, watchTheme } from './shell/theme.ts'
import { restoreState, watchState } from './state/storage.ts'
import { useView } from './state/view.ts'

const root = document.getElementById('root')
if (!root) throw new TypeError('index.html has no #root')
// No await at the top: a part fetched meanwhile may import from this very file's chunk, which would wait for itself.
void start(createRoot(root))

async function start(page: Root): Promise<void> {
  for (const notice of await restoreState()) say('note', notice)
  useView.setState({ theme: keptTheme() })
  watchTheme()
  watchLayout()
  watchState()
  prepareSaving()
  watchKeys(mute)
  watchDrops()
  page.render(
    <StrictMode>
      <CSPProvider disableStyleElements>
        <App />
      </CSPProvider>
    </StrictMode>,
  )
}
