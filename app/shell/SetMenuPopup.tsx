// What the set's menu holds: New, Open, Save, Save as, Demo sets.
import { Menu } from '@base-ui/react/menu'
import { DEMO_SETS } from '../../src/set/demoSets.ts'
import { startingSet } from '../../src/set/intents.ts'
import { parameter } from '../../src/set/parameters.ts'
import type { Intent } from '../../src/set/types.ts'
import { useView } from '../state/view.ts'
import { chooseSetFile, newSet, openDemoSet, saveSet, saveSetAs } from './setFiles.ts'
import { topBarElement } from './topBarElement.ts'
import { useOpenedTrigger } from './usePopup.ts'

const intents = parameter('intent')

export function SetMenuPopup({ button }: { readonly button: React.ReactElement }) {
  const trigger = useOpenedTrigger()
  return (
    <Menu.Root modal={false}>
      <h1 className="cw-set-name">
        <Menu.Trigger ref={trigger} render={button} />
      </h1>
      <Menu.Portal container={topBarElement}>
        <Menu.Positioner className="cw-menu-positioner" align="start" sideOffset={6}>
          <Menu.Popup className="cw-menu">
            <NewMenu />
            <Item keys="Ctrl+O" onClick={() => void chooseSetFile()}>
              Open…
            </Item>
            <Item keys="Ctrl+S" onClick={() => void saveSet()}>
              Save
            </Item>
            <Item onClick={() => void saveSetAs()}>Save as…</Item>
            <DemoMenu />
            <Menu.Separator className="cw-menu-separator" />
            <Item onClick={() => useView.setState({ block: 'set', column: 'fields' })}>Name, notes, rate, layout</Item>
          </Menu.Popup>
        </Menu.Positioner>
      </Menu.Portal>
    </Menu.Root>
  )
}

function NewMenu() {
  return (
    <Submenu label="New">
      {intents.kind === 'choice' &&
        intents.options.map(({ value, label }) => (
          <Item key={value} onClick={() => newSet(startingSet(value as Intent))}>
            {label}
          </Item>
        ))}
    </Submenu>
  )
}

function DemoMenu() {
  return (
    <Submenu label="Demo sets">
      {DEMO_SETS.map((demo) => (
        <Item key={demo.id} onClick={() => void openDemoSet(demo)}>
          <span className="cw-menu-two">
            <span>{demo.name}</span>
            <span className="cw-menu-about">{demo.about}</span>
          </span>
        </Item>
      ))}
    </Submenu>
  )
}

function Submenu({ label, children }: { readonly label: string; readonly children: React.ReactNode }) {
  return (
    <Menu.SubmenuRoot>
      <Menu.SubmenuTrigger className="cw-menu-item">
        {label}
        <span aria-hidden="true">›</span>
      </Menu.SubmenuTrigger>
      <Menu.Portal container={topBarElement}>
        <Menu.Positioner className="cw-menu-positioner" sideOffset={-2} collisionPadding={8}>
          <Menu.Popup className="cw-menu">{children}</Menu.Popup>
        </Menu.Positioner>
      </Menu.Portal>
    </Menu.SubmenuRoot>
  )
}

interface ItemProps {
  readonly children: React.ReactNode
  readonly keys?: string
  readonly onClick: () => void
}

function Item({ children, keys, onClick }: ItemProps) {
  return (
    <Menu.Item className="cw-menu-item" onClick={onClick}>
      {children}
      {keys && <kbd className="cw-menu-keys">{keys}</kbd>}
    </Menu.Item>
  )
}
