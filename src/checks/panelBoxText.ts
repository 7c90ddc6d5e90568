// What panel.box says of a place.
import type { Knob } from '../set/types.ts'
import { quantity } from './loopText.ts'
import type { PanelFinding } from './panelBoxLook.ts'
import type { Check, CheckValue, PanelWorst } from './types.ts'

/** Knobs named at most: beyond, only those that are turned from where they stand. */
const MOST_NAMED = 4

/** "Feedback at 1 and Drive at 0.5"; what the knobs that do not matter do is left out. */
export function placeText(panel: readonly Knob[], { positions, knobs }: Pick<PanelFinding, 'positions' | 'knobs'>): string {
  const turned = knobs.filter((k) => positions[k] !== panel[k]?.position)
  const named = knobs.length <= MOST_NAMED ? knobs : turned
  if (named.length === 0) return 'Where the knobs stand'
  const words = named.map((k) => `${panel[k]?.knob.trim() || `Knob ${k + 1}`} at ${quantity(positions[k] as number)}`)
  return words.length === 1 ? (words[0] as string) : `${words.slice(0, -1).join(', ')} and ${words.at(-1)}`
}

const lowered = (text: string): string => (/^([A-Z][a-z]|A )/.test(text) ? text.charAt(0).toLowerCase() + text.slice(1) : text)

/** One sentence or more about the worst place of one check. */
export function worstText(panel: readonly Knob[], finding: PanelFinding, check: Check): string {
  if (finding.knobs.length === 0) return `No knob moves it: ${lowered(check.text)}`
  return `${placeText(panel, finding)}: ${lowered(check.text)}${sureText(finding, check)}`
}

function sureText({ by, bound, looks }: PanelFinding, { unit }: Check): string {
  if (by === 'rendered corners') return ''
  if (bound === undefined) return ''
  if (bound === null) return ` The worst of ${looks} places tried.`
  if (bound.value === null) return ' What other positions reach has no bound.'
  if (typeof bound.value === 'string') return ` No position is weaker than ${bound.value}.`
  return ` No position passes ${valueText(bound.value, unit)}.`
}

export function valueText(value: CheckValue, unit: string): string {
  if (typeof value === 'number') return quantity(value, unit)
  if (value === null) return 'no figure'
  if (typeof value === 'object')
    return Object.entries(value)
      .map(([key, part]) => `${key} ${typeof part === 'number' ? quantity(part) : String(part)}`)
      .join(', ')
  return String(value)
}

/** How it is known, for the working. */
export function knownText(by: PanelWorst['by']): string {
  switch (by) {
    case 'corners':
      return 'exact: monotone corners'
    case 'intervals':
      return 'bounded over intervals'
    case 'samples':
      return 'the worst of the places tried'
    case 'rendered corners':
      return 'the worst of the places rendered'
  }
}
