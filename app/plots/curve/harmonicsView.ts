// Levels of a driven sine's harmonics against drive; DC and what folds (dashed); the shaper's own drive as a line.

import { HIGHEST_HARMONIC } from '../../workers/curveJob.ts'
import { axis, evenSplits } from '../host/axes.ts'
import { cornerText, middleText } from '../host/corner.ts'
import { createPlot, type Layer } from '../host/createPlot.ts'
import { plotCursor } from '../host/plotCursor.ts'
import { plotTheme } from '../host/theme.ts'
import { decimal } from '../words.ts'
import type { CurvePlace, CurveView } from './curveView.ts'
import { driveIndex, driveWords, harmonicsNumbers, harmonicsSummary, harmonicsTable, ownDrive } from './curveWords.ts'

const LOWEST_DB = -100
const HIGHEST_DB = 6
/** Names of lines stand this far apart at least. */
const NAME_APART_EM = 1.1

export function mountHarmonics({ element, shown, why, changed }: CurvePlace): CurveView {
  let cursor: number | null = null
  const against = () => shown()?.reply.against ?? null
  const drives = (): [number, number] => [against()?.drives[0] ?? 0.1, against()?.drives.at(-1) ?? 30]

  const series = Array.from({ length: HIGHEST_HARMONIC - 1 }, (_, k) => ({
    scale: 'db',
    stroke: () => plotTheme().now,
    // Odd ones lead: a curve with equal halves has no others.
    width: k % 2 === 1 ? 1.75 : 1,
    points: { show: false },
    pxAlign: 0 as const,
  }))
  const dashed = (dash: number[]) => ({
    scale: 'db',
    stroke: () => plotTheme().second,
    width: 1.25,
    dash,
    points: { show: false },
    pxAlign: 0 as const,
  })
  const plot = createPlot(element, {
    scales: { x: { time: false, distr: 3, range: drives }, db: { range: () => [LOWEST_DB, HIGHEST_DB] } },
    axes: [
      axis({ scale: 'x', side: 2, splits: driveSplits, label: (drive) => String(drive) }),
      axis({
        scale: 'db',
        side: 3,
        splits: (min, max, length) => evenSplits(min, max, length, 30, [10, 20, 40]).filter((db) => db < max),
        label: (db) => decimal(db, 0, true),
      }),
    ],
    series: [...series, dashed([2, 3]), dashed([5, 4])],
    data: data(),
    over: (ctx, box, theme, u) => {
      const now = shown()
      if (!now) {
        middleText(ctx, box, theme, why())
        return
      }
      cornerText(ctx, box, theme, 'topLeft', 'dB')
      cornerText(ctx, box, theme, 'bottomRight', 'drive')
      marker(ctx, box, theme, u)
      names(ctx, box, theme, u)
    },
    legend: () => (shown() ? `harmonics of a −6 dBFS sine · dashed: DC, of full scale · dotted: folded of ${toneText()}` : ''),
    onCursor: (part) => {
      cursor = part
      changed()
    },
  })
  const keys = plotCursor(plot, element, {
    label: 'Harmonics at a drive',
    spoken: (part) => {
      const now = against()
      return now ? driveWords(now, driveIndex(now, part)) : why()
    },
  })

  const toneText = () => {
    const hz = Math.min(5000, 0.4 * (shown()?.reply.request.sampleRate ?? 48000))
    return `${decimal(hz / 1000, hz % 1000 === 0 ? 0 : 1)} kHz`
  }

  function data(): Float64Array[] {
    const now = against()
    if (!now) return Array.from({ length: HIGHEST_HARMONIC + 2 }, () => new Float64Array())
    return [now.drives, ...now.harmonics, now.foldedDb, now.dcDb].map((line, i) =>
      i === 0 ? line : line.map((db) => (db < 2 * LOWEST_DB ? Number.NaN : db)),
    )
  }

  /** The shaper's own drive, with a dot on every line. */
  const marker: Layer = (ctx, box, theme, u) => {
    const reply = shown()?.reply
    if (!reply) return
    const x = Math.round(u.valToPos(reply.request.shaper.drive, 'x', true)) + 0.5
    const i = ownDrive(reply)
    ctx.strokeStyle = theme.ink
    ctx.lineWidth = 1.25 * box.ratio
    ctx.beginPath()
    ctx.moveTo(x, box.top)
    ctx.lineTo(x, box.top + box.height)
    ctx.stroke()
    const lines = [...reply.against.harmonics, reply.against.foldedDb, reply.against.dcDb]
    lines.forEach((db, k) => {
      if (!((db[i] as number) > LOWEST_DB)) return
      ctx.fillStyle = k < reply.against.harmonics.length ? theme.now : theme.second
      ctx.beginPath()
      ctx.arc(x, u.valToPos(db[i] as number, 'db', true), 3 * box.ratio, 0, 2 * Math.PI)
      ctx.fill()
    })
  }

  /** Each line's name at its right end, those that would stand on another left out. */
  const names: Layer = (ctx, box, theme, u) => {
    const now = against()
    if (!now) return
    const last = now.drives.length - 1
    const all = [
      { text: 'DC', db: now.dcDb[last] as number, colour: theme.second },
      { text: 'folded', db: now.foldedDb[last] as number, colour: theme.second },
      ...now.harmonics.map((db, k) => ({ text: String(k + 2), db: db[last] as number, colour: theme.now })),
    ]
    const apart = NAME_APART_EM * theme.textPx * box.ratio
    const taken: number[] = []
    ctx.textAlign = 'right'
    ctx.textBaseline = 'bottom'
    for (const { text, db, colour } of all) {
      const y = u.valToPos(db, 'db', true) - 2 * box.ratio
      if (!(db > LOWEST_DB) || taken.some((other) => Math.abs(other - y) < apart)) continue
      taken.push(y)
      ctx.fillStyle = colour
      ctx.fillText(text, box.left + box.width - 2 * box.ratio, y)
    }
  }

  return {
    update: () => plot.u.setData(data() as [Float64Array, ...Float64Array[]]),
    frame() {},
    reading: ({ reply }) => driveWords(reply.against, cursor === null ? ownDrive(reply) : driveIndex(reply.against, cursor)),
    summary: harmonicsSummary,
    table: harmonicsTable,
    numbers: harmonicsNumbers,
    picture: plot.picture,
    destroy() {
      keys.destroy()
      plot.destroy()
    },
  }
}

function driveSplits(min: number, max: number): number[] {
  const found: number[] = []
  for (let decade = 10 ** Math.floor(Math.log10(min)); decade <= max; decade *= 10)
    for (const step of [1, 3]) {
      const drive = Number((step * decade).toPrecision(3))
      if (drive >= min && drive <= max) found.push(drive)
    }
  return found
}
