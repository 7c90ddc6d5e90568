// The panel: its knobs as the finished unit's player turns them, and beneath them the fields of the one being edited.
import './panel.css'
import { useState } from 'react'
import { turnKnob } from '../../../../src/set/panel.ts'
import { currentSet, useCurrent } from '../../../state/current.ts'
import { committedSet } from '../../../state/document.ts'
import { usePanelView } from '../../../state/panelView.ts'
import { Dial } from './Dial.tsx'
import { FieldChooser } from './FieldChooser.tsx'
import { KnobEditor } from './KnobEditor.tsx'
import { putOnNewKnob } from './knobActs.ts'
import { fullPanel, whyNotPanel } from './panelWords.ts'

export function Panel() {
  const set = useCurrent((s) => s.set)
  const wanted = usePanelView((s) => s.knob)
  const [held, setHeld] = useState<{ readonly index: number; readonly position: number | undefined; readonly why: string } | null>(null)
  const chosen = Math.min(wanted, set.panel.length - 1)
  const choose = (knob: number) => usePanelView.setState({ knob })
  const add = (path: string) => {
    if (putOnNewKnob(path).length === 0) choose(committedSet().panel.length - 1)
  }
  const full = fullPanel(set)
  // Said while the knob stands where it was held.
  const isHeld = held !== null && set.panel[held.index]?.position === held.position
  return (
    <div className="cw-panel">
      {set.panel.length === 0 ? (
        <p className="cw-panel-empty">No knobs yet: choose what the first one moves, or put a field on one from where it stands.</p>
      ) : (
        <fieldset className="cw-panel-row" aria-label="Knobs">
          {set.panel.map((_, index) => (
            <Dial
              // A knob has no name of its own that stays: its place is what it is.
              // biome-ignore lint/suspicious/noArrayIndexKey: see above
              key={index}
              {...{ set, index }}
              chosen={index === chosen}
              onChoose={choose}
              onTurn={([problem], position) =>
                setHeld(
                  problem
                    ? {
                        index,
                        position: currentSet().panel[index]?.position,
                        why: `Held: ${whyNotPanel(problem, turnKnob(committedSet(), index, position))}`,
                      }
                    : null,
                )
              }
            />
          ))}
        </fieldset>
      )}
      <p className="cw-field-held cw-panel-held" role="status">
        {isHeld && (
          <>
            <span aria-hidden="true">△ </span>
            {held.why}
          </>
        )}
      </p>
      {full === null ? <FieldChooser label="Add a knob for" onChoose={add} /> : <p>{full}</p>}
      {chosen >= 0 && (
        <KnobEditor
          key={`${chosen} ${set.panel.length}`}
          {...{ set }}
          index={chosen}
          onPlaced={(to) => choose(to ?? Math.max(0, chosen - 1))}
        />
      )}
    </div>
  )
}
