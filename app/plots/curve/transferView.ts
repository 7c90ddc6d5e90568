// The transfer curve with its table's points, the table's error (dashed, its own scale) under its bound, and how far the sound reaches up it.

import { DASH_PX } from '../drawBand.ts'
import { axis, evenSplits } from '../host/axes.ts'
import { cornerText, middleText } from '../host/corner.ts'
import { createPlot, type Layer } from '../host/createPlot.ts'
import { plotCursor } from '../host/plotCursor.ts'
import { plotTheme } from '../host/theme.ts'
import { decimal } from '../words.ts'
import type { CurvePlace, CurveView } from './curveView.ts'
import {
  beyondWords,
  scientific,
  transferCursorWords,
  transferNumbers,
  transferRestWords,
  transferSummary,
  transferTable,
} from './curveWords.ts'
import { soundingReach } from './soundingReach.ts'

const DOT_PX = 2.25
const REACH_PX = 7
/** The legend stands above the curve's end. */
const AIR = 1.3

export function mountTransfer({ element, shown, why, changed }: CurvePlace): CurveView {
  let cursor: number | null = null
  let reach = ''
  const transfer = () => shown()?.reply.transfer ?? null

  const curveRange = (): [number, number] => {
    const y = transfer()?.y
    if (!y) return [-1.1, 1.1]
    const most =
      Math.max(
        y.reduce((a, b) => Math.max(a, Math.abs(b)), 0),
        0.05,
      ) * AIR
    return [-most, most]
  }
  /** The bound's place, unless it is far above everything there is. */
  const errorTop = () => {
    const { bound = 0, largest = 0 } = transfer() ?? {}
    return Math.max(bound <= 4 * largest ? bound : largest, 1e-16) * 1.25
  }

  const plot = createPlot(element, {
    scales: {
      x: { time: false, range: () => [transfer()?.x[0] ?? -1, transfer()?.x.at(-1) ?? 1] },
      y: { range: curveRange },
      error: { range: () => [-errorTop(), errorTop()] },
    },
    axes: [
      axis({ scale: 'x', side: 2, splits: (min, max, length) => evenSplits(min, max, length, 60), label: plain }),
      axis({ scale: 'y', side: 3, splits: (min, max, length) => evenSplits(min, max, length, 30), label: plain, colour: 'now' }),
      axis({
        scale: 'error',
        side: 1,
        splits: (_, max, length) => (transfer()?.largest ? evenSplits(0, max, length / 2, 24) : []),
        label: (value) => scientific(value, 2),
        colour: 'second',
        grid: false,
        room: 5,
      }),
    ],
    series: [
      { scale: 'error', stroke: () => plotTheme().second, width: 1.25, dash: [5, 4], points: { show: false }, pxAlign: 0 },
      { scale: 'y', stroke: () => plotTheme().now, width: 1.75, points: { show: false }, pxAlign: 0 },
    ],
    data: data(),
    under: (ctx, box, theme, u) => {
      if (transfer()) under(ctx, box, theme, u)
    },
    over: (ctx, box, theme, u) => {
      const now = transfer()
      if (!now) {
        middleText(ctx, box, theme, why())
        return
      }
      cornerText(ctx, box, theme, 'topLeft', 'out', theme.now)
      cornerText(ctx, box, theme, 'bottomRight', 'in, of full scale')
      dots(ctx, box, theme, u)
      bound(ctx, box, theme, u)
    },
    live: (ctx, box, theme, u) => {
      const now = transfer()
      const level = now && soundingReach(shown())
      if (!now || !level) return
      ctx.strokeStyle = theme.now
      ctx.globalAlpha = 0.3
      ctx.lineCap = 'round'
      ctx.lineWidth = REACH_PX * box.ratio
      ctx.beginPath()
      now.x.forEach((x, i) => {
        if (level.of === 'in' ? Math.abs(x) > level.peak : Math.abs(now.y[i] as number) > level.peak) return
        ctx.lineTo(u.valToPos(x, 'x', true), u.valToPos(now.y[i] as number, 'y', true))
      })
      ctx.stroke()
    },
    legend: () => legend(),
    onCursor: (part) => {
      cursor = part
      changed()
    },
  })
  const keys = plotCursor(plot, element, {
    label: 'Curve at an input',
    spoken: (part) => (shown() ? transferCursorWords(shown()!.reply, part) : why()),
  })

  function data(): [Float64Array, Float64Array, Float64Array] {
    const now = transfer()
    return now ? [now.x, now.error, now.y] : [new Float64Array(), new Float64Array(), new Float64Array()]
  }

  function legend(): string {
    const now = shown()
    if (!now) return ''
    const { transfer: t, request } = now.reply
    const parts = [t.tableX.length > 0 ? 'dots: table points' : `table: ${decimal(request.shaper.tableSize + 1, 0)} points`]
    parts.push(t.largest > 0 ? 'dashed: table error' : 'table exact')
    if (reach !== '') parts.push('thick: the sound now')
    const beyond = beyondWords(t, request.shaper.tableRange)
    if (beyond) parts.push(beyond)
    return parts.join(' · ')
  }

  /** Axes through 0, and the ends the table holds. */
  const under: Layer = (ctx, box, theme, u) => {
    const at = (x: number, y: number) => [u.valToPos(x, 'x', true), u.valToPos(y, 'y', true)] as const
    const [zeroX, zeroY] = at(0, 0)
    ctx.strokeStyle = theme.edge
    ctx.lineWidth = box.ratio
    ctx.beginPath()
    ctx.moveTo(zeroX, box.top)
    ctx.lineTo(zeroX, box.top + box.height)
    ctx.moveTo(box.left, zeroY)
    ctx.lineTo(box.left + box.width, zeroY)
    ctx.stroke()
    const now = shown()
    if (!now) return
    const { tableRange } = now.reply.request.shaper
    const { x, y } = now.reply.transfer
    ctx.strokeStyle = theme.ink
    ctx.lineWidth = 1.25 * box.ratio
    ctx.beginPath()
    for (const side of [-1, 1]) {
      const held = nearest(x, y, side * tableRange)
      ctx.moveTo(...at(side * tableRange, held))
      ctx.lineTo(...at(side < 0 ? (x[0] as number) : (x.at(-1) as number), held))
    }
    ctx.stroke()
  }

  const dots: Layer = (ctx, box, theme, u) => {
    const now = transfer()
    ctx.fillStyle = theme.ink
    now?.tableX.forEach((x, i) => {
      ctx.beginPath()
      ctx.arc(u.valToPos(x, 'x', true), u.valToPos(now.tableY[i] as number, 'y', true), DOT_PX * box.ratio, 0, 2 * Math.PI)
      ctx.fill()
    })
  }

  const bound: Layer = (ctx, box, theme, u) => {
    const now = transfer()
    if (!now || now.largest === 0 || now.bound > errorTop()) return
    const y = Math.round(u.valToPos(now.bound, 'error', true)) + 0.5
    ctx.strokeStyle = theme.second
    ctx.lineWidth = box.ratio
    ctx.setLineDash(DASH_PX.map((px) => px * box.ratio))
    ctx.beginPath()
    ctx.moveTo(box.left, y)
    ctx.lineTo(box.left + box.width, y)
    ctx.stroke()
    ctx.setLineDash([])
    ctx.fillStyle = theme.second
    ctx.textAlign = 'left'
    ctx.textBaseline = 'top'
    ctx.fillText(
      now.boundBy === 'bend' ? 'bound h²/8 · max|f″|' : 'bound h/4 · change of slope',
      box.left + 4 * box.ratio,
      y + 3 * box.ratio,
    )
  }

  return {
    update: () => plot.u.setData(data()),
    frame() {
      const level = soundingReach(shown())
      const next = level ? `${level.of} ${level.peak.toFixed(3)}` : ''
      if (next === reach) return
      const comesOrGoes = (next === '') !== (reach === '')
      reach = next
      if (comesOrGoes) plot.redraw()
      else plot.drawLive()
    },
    reading: ({ reply }) => (cursor === null ? transferRestWords(reply) : transferCursorWords(reply, cursor)),
    summary: transferSummary,
    table: transferTable,
    numbers: transferNumbers,
    picture: plot.picture,
    destroy() {
      keys.destroy()
      plot.destroy()
    },
  }
}

function nearest(x: Float64Array, y: Float64Array, at: number): number {
  const i = Math.round(((at - (x[0] as number)) / ((x.at(-1) as number) - (x[0] as number))) * (x.length - 1))
  return y[Math.max(0, Math.min(x.length - 1, i))] as number
}

const plain = (value: number, all: readonly number[]): string =>
  decimal(value, Math.min(4, Math.max(...all.map((each) => (String(each).split('.')[1] ?? '').length))))
