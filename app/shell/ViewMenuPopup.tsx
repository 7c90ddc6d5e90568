// What the view menu holds: how the page looks and listens to keys: theme, letter keys, the list of keys.
import { Menu } from '@base-ui/react/menu'
import { useState } from 'react'
import { useView } from '../state/view.ts'
import { KeyHelp } from './KeyHelp.tsx'
import { chooseTheme, type Theme } from './theme.ts'
import { topBarElement } from './topBarElement.ts'
import { useOpenedTrigger } from './usePopup.ts'

const THEMES: readonly { readonly value: Theme; readonly label: string }[] = [
  { value: 'system', label: 'As the system' },
  { value: 'light', label: 'Light' },
  { value: 'dark', label: 'Dark' },
]

export function ViewMenuPopup({ button }: { readonly button: React.ReactElement }) {
  const trigger = useOpenedTrigger()
  const theme = useView((s) => s.theme)
  const letterKeys = useView((s) => s.letterKeys)
  const [help, setHelp] = useState(false)
  return (
    <>
      <Menu.Root modal={false}>
        <Menu.Trigger ref={trigger} render={button} />
        <Menu.Portal container={topBarElement}>
          <Menu.Positioner className="cw-menu-positioner" align="start" sideOffset={6}>
            <Menu.Popup className="cw-menu">
              <Menu.RadioGroup value={theme} onValueChange={(value) => chooseTheme(value as Theme)}>
                <Menu.GroupLabel className="cw-menu-label">Theme</Menu.GroupLabel>
                {THEMES.map(({ value, label }) => (
                  <Menu.RadioItem key={value} value={value} className="cw-menu-item">
                    <span>
                      <Mark on={theme === value} />
                      {label}
                    </span>
                  </Menu.RadioItem>
                ))}
              </Menu.RadioGroup>
              <Menu.Separator className="cw-menu-separator" />
              <Menu.CheckboxItem
                className="cw-menu-item"
                checked={letterKeys}
                onCheckedChange={(on) => useView.setState({ letterKeys: on })}
              >
                <span>
                  <Mark on={letterKeys} />
                  Letter keys
                </span>
              </Menu.CheckboxItem>
              <Menu.Item className="cw-menu-item" onClick={() => setHelp(true)}>
                <span>
                  <Mark on={false} />
                  Keys…
                </span>
              </Menu.Item>
            </Menu.Popup>
          </Menu.Positioner>
        </Menu.Portal>
      </Menu.Root>
      <KeyHelp open={help} onClose={() => setHelp(false)} />
    </>
  )
}

const Mark = ({ on }: { readonly on: boolean }) => (
  <span className="cw-menu-mark" aria-hidden="true">
    {on ? '✓' : ''}
  </span>
)
