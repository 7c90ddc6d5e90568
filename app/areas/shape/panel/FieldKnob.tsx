// At a field's label: the way onto a knob, or the knob it is on. What it opens comes when it is wanted.
import './fieldKnob.css'
import type { ReactElement } from 'react'
import { parameter } from '../../../../src/set/parameters.ts'
import { usePopup } from '../../../shell/usePopup.ts'
import { useCurrent } from '../../../state/current.ts'

const loadMenu = () => import('./FieldKnobMenu.tsx').then((part) => part.FieldKnobMenu)

export function FieldKnob({ path }: { readonly path: string }) {
  const [Menu, closed] = usePopup(loadMenu, 'menu')
  const knob = useCurrent((s) => s.set.panel.find(({ moves }) => moves.some((move) => move.parameter === path))?.knob)
  const label = parameter(path).label.toLowerCase()
  const name = knob === undefined ? `Put ${label} on a knob` : `${parameter(path).label} is on knob ${knob}`
  const button: ReactElement = (
    <button type="button" className="cw-field-knob" data-on={knob !== undefined || undefined} aria-label={name} title={name} {...closed}>
      <svg viewBox="0 0 16 16" aria-hidden="true">
        <path d="M4.5 12.5A5.5 5.5 0 1 1 11.5 12.5M8 8.5L10.5 5.5" />
      </svg>
      {knob !== undefined && <span className="cw-field-knob-name">{knob}</span>}
    </button>
  )
  return Menu ? <Menu button={button} path={path} /> : button
}
