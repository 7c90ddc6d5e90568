// Which knob of the panel is being edited: gone on reload, like which field has the focus.
import { create } from 'zustand'
import { useView } from './view.ts'

export const usePanelView = create<{ readonly knob: number }>()(() => ({ knob: 0 }))

/** Shows the panel with one of its knobs chosen. */
export function showKnob(knob: number): void {
  usePanelView.setState({ knob })
  useView.setState({ column: 'panel' })
}
