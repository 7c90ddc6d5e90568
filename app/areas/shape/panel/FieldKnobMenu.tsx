// What can be done with a field and the knobs there are.
import { Menu } from '@base-ui/react/menu'
import type { ReactElement } from 'react'
import { moveOf } from '../../../../src/set/panelEdit.ts'
import { getAt } from '../../../../src/set/path.ts'
import type { Problem } from '../../../../src/set/result.ts'
import { announce } from '../../../shell/announce.ts'
import { say } from '../../../shell/messages.ts'
import { useOpenedTrigger } from '../../../shell/usePopup.ts'
import { useCurrent } from '../../../state/current.ts'
import { committedSet } from '../../../state/document.ts'
import { knobName } from '../../../state/panel.ts'
import { showKnob } from '../../../state/panelView.ts'
import { putOnKnob, putOnNewKnob, takeOffKnob } from './knobActs.ts'
import { fullKnob, fullPanel, knobNameOf, parameterLabel, whyNotPanel } from './panelWords.ts'

interface FieldKnobMenuProps {
  readonly button: ReactElement
  readonly path: string
}

export function FieldKnobMenu({ button, path }: FieldKnobMenuProps) {
  const trigger = useOpenedTrigger()
  const set = useCurrent((s) => s.set)
  const found = moveOf(set, path)
  const label = parameterLabel(path)
  const isOff = getAt(set, path) === null
  return (
    <Menu.Root modal={false}>
      <Menu.Trigger ref={trigger} render={button} />
      {/* Inside the area, so that it belongs to its landmark. */}
      <Menu.Portal container={document.getElementById('shape')}>
        <Menu.Positioner className="cw-menu-positioner" positionMethod="fixed" align="start" sideOffset={4}>
          <Menu.Popup className="cw-menu">
            {found ? (
              <>
                <Item onClick={() => showKnob(found.index)}>Show knob {knobName(found.knob, found.index)}</Item>
                <Item onClick={() => told(takeOffKnob(path), `${label} is on no knob`)}>
                  Take off knob {knobName(found.knob, found.index)}
                </Item>
                {found.knob.moves.length > 1 && (
                  <Item off={fullPanel(set)} onClick={() => told(putOnNewKnob(path), onWhich(path))}>
                    Give it a knob of its own
                  </Item>
                )}
              </>
            ) : (
              <>
                <Item off={fullPanel(set)} onClick={() => told(putOnNewKnob(path), onWhich(path))}>
                  {isOff ? 'Switch on, on a new knob' : 'On a new knob'}
                </Item>
                {set.panel.map((knob, index) => (
                  <Item
                    // biome-ignore lint/suspicious/noArrayIndexKey: a knob's place is what it is
                    key={index}
                    off={fullKnob(knob)}
                    onClick={() => told(putOnKnob(path, index), onWhich(path))}
                  >
                    Also on knob {knobName(knob, index)}
                  </Item>
                ))}
              </>
            )}
          </Menu.Popup>
        </Menu.Positioner>
      </Menu.Portal>
    </Menu.Root>
  )
}

const onWhich = (path: string) => () => `${parameterLabel(path)} is on knob ${knobNameOf(committedSet(), path) ?? ''}`

/** Says once what came of it: done, or why not. */
function told([problem]: readonly Problem[], done: string | (() => string)): void {
  if (problem) say('refusal', whyNotPanel(problem, null), problem.hint ? [problem.hint] : [])
  else announce(typeof done === 'string' ? done : done())
}

interface ItemProps {
  readonly children: React.ReactNode
  readonly onClick: () => void
  /** Why it cannot be chosen, null when it can. */
  readonly off?: string | null
}

function Item({ children, onClick, off = null }: ItemProps) {
  return (
    <Menu.Item className="cw-menu-item" disabled={off !== null} onClick={onClick}>
      <span>
        {children}
        {off !== null && ` (${off})`}
      </span>
    </Menu.Item>
  )
}
