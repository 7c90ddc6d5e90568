// Levels of a driven sine's harmonics against drive; DC and what folds (dashed); the shaper's own drive as a line.

import { aliasToneHz } from '../../../src/analysis/folded.ts'
import { axis, evenSplits } from '../host/axes.ts'
import { cornerText, middleText } from '../host/corner.ts'
import { createPlot, type Layer } from '../host/createPlot.ts'
import { plotCursor } from '../host/plotCursor.ts'
import { plotTheme } from '../host/theme.ts'
import { decimal } from '../words.ts'
import type { CurvePlace, CurveView } from './curveView.ts'
import { driveIndex, driveWords, harmonicsNumbers, harmonicsSummary, harmonicsTable } from './curveWords.ts'

/** Harmonics drawn, 2 to this. */
export const HIGHEST_HARMONIC = 9
const LOWEST_DB = -100
const HIGHEST_DB = 6

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
    const hz = aliasToneHz(shown()?.reply.request.sampleRate ?? 48000)
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
    ctx.strokeStyle = theme.ink
    ctx.lineWidth = 1.25 * box.ratio
    ctx.setLineDash([])
    ctx.beginPath()
    ctx.moveTo(x, box.top)
    ctx.lineTo(x, box.top + box.height)
    ctx.stroke()
    const { harmonics, foldedDb, dcDb } = reply.own
    const lines = [...harmonics, foldedDb, dcDb]
    lines.forEach((db, k) => {
      if (!((db[0] as number) > LOWEST_DB)) return
      ctx.fillStyle = k < harmonics.length ? theme.now : theme.second
      ctx.beginPath()
      ctx.arc(x, u.valToPos(db[0] as number, 'db', true), 3 * box.ratio, 0, 2 * Math.PI)
      ctx.fill()
    })
  }

  const names: Layer = (ctx, box, theme, u) => {
    const now = against()
    if (!now) return
    const lines = [
      ...now.harmonics.map((db, k) => ({ text: String(k + 2), db, colour: theme.now })),
      { text: 'DC', db: now.dcDb, colour: theme.second },
      { text: 'folded', db: now.foldedDb, colour: theme.second },
    ]
    ctx.textAlign = 'center'
    ctx.textBaseline = 'bottom'
    const apart = theme.textPx * box.ratio
    for (const { text, i, colour, db } of namePlaces(lines, (level) => u.valToPos(level, 'db', true), apart)) {
      ctx.fillStyle = colour
      ctx.fillText(text, u.valToPos(now.drives[i] as number, 'x', true), u.valToPos(db[i] as number, 'db', true) - 2 * box.ratio)
    }
  }

  return {
    update: () => plot.u.setData(data() as [Float64Array, ...Float64Array[]]),
    frame() {},
    reading: ({ reply }) => (cursor === null ? driveWords(reply.own, 0) : driveWords(reply.against, driveIndex(reply.against, cursor))),
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

interface Line {
  readonly text: string
  readonly db: Float64Array
  readonly colour: string
}

/** Parts of the width at which a line may be named. */
const NAME_AT = [0.93, 0.83, 0.73, 0.63, 0.43, 0.33, 0.23, 0.13, 0.05]
const TOP_DB = -6

/** For each line the place where it is farthest from the other lines, and from names that stand already; none where it would touch. */
function namePlaces(lines: readonly Line[], y: (db: number) => number, apart: number): (Line & { readonly i: number })[] {
  const placed: (Line & { readonly i: number })[] = []
  for (const line of lines) {
    let best = { i: -1, room: apart * 0.6 }
    for (const part of NAME_AT) {
      const i = Math.round(part * (line.db.length - 1))
      const level = line.db[i] as number
      if (!(level > LOWEST_DB + 4 && level < TOP_DB)) continue
      const taken = placed.filter((other) => other.i === i).map((other) => Math.abs(y(other.db[i] as number) - y(level)))
      if (taken.some((distance) => distance < 1.2 * apart)) continue
      const room = Math.min(
        ...lines
          .filter((other) => other !== line && !Number.isNaN(other.db[i]))
          .map((other) => Math.abs(y(other.db[i] as number) - y(level))),
      )
      if (room > best.room) best = { i, room }
    }
    if (best.i >= 0) placed.push({ ...line, i: best.i })
  }
  return placed
}
