// The tabs of a pane: one stop for Tab, arrows walk and choose.
import { PLOTS } from '../../../plots/plotList.ts'
import type { PlotId } from '../../../state/view.ts'

export const plotTabId = (panelId: string, id: PlotId): string => `${panelId}-${id}`

interface PlotTabsProps {
  readonly label: string
  readonly chosen: PlotId
  readonly panelId: string
  onChoose(id: PlotId): void
}

export function PlotTabs({ label, chosen, panelId, onChoose }: PlotTabsProps) {
  const walk = (event: React.KeyboardEvent<HTMLElement>) => {
    const to = tabFrom(chosen, event.key)
    if (to === null) return
    event.preventDefault()
    onChoose(to)
    document.getElementById(plotTabId(panelId, to))?.focus()
  }
  return (
    <div className="cw-plot-tabs" role="tablist" aria-label={label} onKeyDown={walk}>
      {PLOTS.map(({ id, label: name, load }) => (
        <button
          key={id}
          type="button"
          id={plotTabId(panelId, id)}
          className="cw-plot-tab"
          role="tab"
          aria-selected={id === chosen}
          aria-controls={panelId}
          tabIndex={id === chosen ? 0 : -1}
          onPointerEnter={() => void load().catch(() => {})}
          onClick={() => onChoose(id)}
        >
          {name}
        </button>
      ))}
    </div>
  )
}

/** The tab an arrow, Home or End leads to, round the ends; null for other keys. */
function tabFrom(chosen: PlotId, key: string): PlotId | null {
  const at = PLOTS.findIndex(({ id }) => id === chosen)
  switch (key) {
    case 'ArrowRight':
      return PLOTS[(at + 1) % PLOTS.length]?.id ?? null
    case 'ArrowLeft':
      return PLOTS.at(at - 1)?.id ?? null
    case 'Home':
      return PLOTS[0]?.id ?? null
    case 'End':
      return PLOTS.at(-1)?.id ?? null
    default:
      return null
  }
}
