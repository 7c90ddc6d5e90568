// The menu of what can be had of a plot besides looking at it.
import { Menu } from '@base-ui/react/menu'
import { useState } from 'react'
import { csvText, plotFileName, savePicture } from '../../../plots/saveFile.ts'
import { download } from '../../../shell/fileAccess.ts'
import { useOpenedTrigger } from '../../../shell/usePopup.ts'
import { currentSet } from '../../../state/current.ts'
import type { PlotMenuProps } from './PlotMenu.tsx'

interface PlotPopupProps extends PlotMenuProps {
  readonly button: React.ReactElement
}

export function PlotPopup({ button, id, mounted, asTable, onTable }: PlotPopupProps) {
  const trigger = useOpenedTrigger()
  const [problem, setProblem] = useState('')
  const name = (ending: string) => plotFileName(currentSet().name, id, ending)
  const numbers = () => {
    if (mounted) download(name('csv'), new Blob([csvText(mounted.numbers())], { type: 'text/csv' }))
  }
  const picture = () => {
    if (!mounted) return
    setProblem('')
    savePicture(name('png'), mounted.picture()).catch((error: Error) => setProblem(`The picture was not saved: ${error.message}`))
  }
  return (
    <>
      <Menu.Root>
        <Menu.Trigger ref={trigger} render={button} />
        <Menu.Portal>
          <Menu.Positioner align="end" sideOffset={4} className="cw-plot-menu-place">
            <Menu.Popup className="cw-plot-menu">
              <Menu.Item className="cw-plot-menu-item" onClick={() => onTable(!asTable)}>
                {asTable ? 'Show the plot' : 'Show as a table'}
              </Menu.Item>
              <Menu.Item className="cw-plot-menu-item" onClick={picture}>
                Save the picture (PNG)
              </Menu.Item>
              <Menu.Item className="cw-plot-menu-item" onClick={numbers}>
                Save the numbers (CSV)
              </Menu.Item>
            </Menu.Popup>
          </Menu.Positioner>
        </Menu.Portal>
      </Menu.Root>
      <p className="cw-unseen" role="status">
        {problem}
      </p>
    </>
  )
}
