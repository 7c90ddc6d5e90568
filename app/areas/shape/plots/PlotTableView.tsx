// A plot's numbers as a table, in front of the plot; renewed once a second while they change.
import { useEffect, useState } from 'react'
import type { MountedPlot, PlotTable } from '../../../plots/plotTypes.ts'
import { everySecond } from '../../../state/frames.ts'

export function PlotTableView({ mounted }: { readonly mounted: MountedPlot }) {
  const [table, setTable] = useState<PlotTable>(() => mounted.table())
  useEffect(() => {
    let text = ''
    return everySecond(() => {
      const next = mounted.table()
      const nextText = JSON.stringify(next)
      if (nextText !== text) setTable(next)
      text = nextText
    })
  }, [mounted])
  return (
    // biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls must be reachable from the keyboard
    <section className="cw-plot-table" aria-label={table.caption} tabIndex={0}>
      <table>
        <caption>{table.caption}</caption>
        <thead>
          <tr>
            {table.head.map((name) => (
              <th key={name} scope="col">
                {name}
              </th>
            ))}
          </tr>
        </thead>
        <tbody>
          {table.rows.map(([name = '', ...cells]) => (
            <tr key={name}>
              <th scope="row">{name}</th>
              {cells.map((cell, i) => (
                <td key={table.head[i + 1]}>{cell}</td>
              ))}
            </tr>
          ))}
        </tbody>
      </table>
    </section>
  )
}
