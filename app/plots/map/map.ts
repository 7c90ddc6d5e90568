// Map: level against sweep position and frequency as a picture, with the tracks of notches and peaks; the position being shown
// moves over it and can be taken hold of.
import { currentSet, subscribeSet } from '../../state/current.ts'
import { onFrame } from '../../state/frames.ts'
import { shownPosition } from '../../state/position.ts'
import { useView } from '../../state/view.ts'
import { analysis } from '../../workers/analysisClient.ts'
import type { MapRequest, SweepMap } from '../../workers/analysisJobs/map.ts'
import { axisColumns, type Columns, frequencyAt, partOf, sameColumns } from '../columns.ts'
import { axis, DECIBEL_STEPS, evenSplits, frequencyLabel, frequencySplits } from '../host/axes.ts'
import { middleText } from '../host/corner.ts'
import { createPlot, type Layer } from '../host/createPlot.ts'
import type { PlotTheme } from '../host/theme.ts'
import type { Levels } from '../levels.ts'
import type { MountedPlot, PlotPlace } from '../plotTypes.ts'
import { readingLine } from '../readingLine.ts'
import { COMPUTED, RENEWED, staleness } from '../staleness.ts'
import { nowMarker } from '../sweep/nowMarker.ts'
import '../sweep/sweep.css'
import './map.css'
import { decimal } from '../words.ts'
import { channelButton } from './channelButton.ts'
import { drawCells, drawScale, drawTracks, drawUnits, SCALE_ROOM_PX } from './drawMap.ts'
import { frequencyHair } from './frequencyHair.ts'
import { cellPicture, scalePicture, shadeLevels, themeShades } from './mapPicture.ts'
import { firstNotchAt, mapLegend, mapNumbers, mapSummary, mapTable, placeWords, restWords } from './mapWords.ts'

const HEAD_PX = 26
/** A first picture with few positions at once, the whole one when nothing has changed for a while. */
const COARSE = { positions: 48, rowPx: 3 }
const CELL_PX = 2
const MOST_POSITIONS = 400
const REST_MS = 200

export function mountMap({ element, reading }: PlotPlace): MountedPlot {
  let size = { widthPx: element.clientWidth, heightPx: element.clientHeight }
  let rows = rowsOf(size.heightPx)
  let map: SweepMap | null = null
  let shownSet = currentSet()
  let levels: Levels = { minDb: -24, maxDb: 6 }
  let problem = ''
  let channel = 0
  let picture: Picture | null = null
  let asked: 'coarse' | 'whole' | null = null
  let rest: ReturnType<typeof setTimeout> | undefined
  let across: number | null = null
  let placed = Number.NaN

  const feed = analysis().openFeed(
    'map',
    (reply, request) => {
      asked = null
      map = reply
      shownSet = request.set
      problem = ''
      picture = null
      age.shows(request.set)
      levels = shadeLevels(reply)
      placed = Number.NaN
      choice.offer(reply.differs)
      if (!reply.differs) channel = 0
      plot.u.setScale('shade', { min: levels.minDb, max: levels.maxDb })
      plot.redraw()
      line.changed()
      hair.speak()
      clearTimeout(rest)
      if (request.rows.count < rows.count || request.set !== currentSet()) rest = setTimeout(askWhole, REST_MS)
    },
    (message) => {
      asked = null
      problem = `This plot could not be computed:\n${message}`
      plot.redraw()
    },
  )

  const under: Layer = (ctx, box, theme) => {
    const surface = { ctx, box, theme, rows }
    drawUnits(surface)
    if (!map) return
    if (picture?.theme !== theme) {
      const shades = themeShades(theme)
      picture = { theme, cells: cellPicture(map, channel, levels, shades), scale: scalePicture(shades) }
    }
    drawCells(surface, picture.cells, age.isStale())
    drawScale(surface, picture.scale)
    if (!age.isStale()) drawTracks(surface, map.tracks)
  }
  const shadeAxis = axis({
    scale: 'shade',
    side: 1,
    splits: (min, max, length) => evenSplits(min, max, length, 24, DECIBEL_STEPS),
    label: (db) => decimal(db, 0, true),
    grid: false,
    room: 2.4,
  })
  const plot = createPlot(element, {
    scales: {
      x: { time: false, range: [0, 1] },
      hz: { auto: false, distr: 3, range: () => [rows.lowHz, rows.highHz] },
      shade: { auto: false, range: () => [levels.minDb, levels.maxDb] },
    },
    axes: [
      axis({
        scale: 'x',
        side: 2,
        splits: () => [0, 0.25, 0.5, 0.75, 1],
        label: (part) => decimal(part, part % 0.5 === 0 ? (part % 1 === 0 ? 0 : 1) : 2),
        grid: false,
      }),
      axis({
        scale: 'hz',
        side: 3,
        splits: (min, max, length) => frequencySplits(min, max, length, 16),
        label: frequencyLabel,
        grid: false,
      }),
      { ...shadeAxis, gap: SCALE_ROOM_PX, size: SCALE_ROOM_PX + (shadeAxis.size as number) },
    ],
    series: [
      { scale: 'hz', show: false },
      { scale: 'shade', show: false },
    ],
    data: [
      [0, 1],
      [1, 1],
      [0, 0],
    ],
    headRoomPx: HEAD_PX,
    under,
    over: (ctx, box, theme) => {
      if (problem !== '' || !map) middleText(ctx, box, theme, problem === '' ? COMPUTED : problem)
    },
    legend: () => (map ? `${mapLegend(map)}${age.isStale() ? RENEWED : ''}` : ''),
    onCursor: (part) => {
      across = part
      read()
    },
    onSize: (widthPx, heightPx) => {
      size = { widthPx, heightPx }
      placed = Number.NaN
      const next = rowsOf(heightPx)
      if (!sameColumns(next, rows)) {
        rows = next
        ask()
      }
    },
  })
  plot.u.root.classList.add('cw-map')
  const choice = channelButton(element, (second) => {
    channel = second ? 1 : 0
    picture = null
    plot.redraw()
    read()
  })
  const hair = frequencyHair(plot.u, {
    spoken: (part) => placeWords(currentSet(), map, channel, { position: shownPosition(), hz: frequencyAt(rows, part) }),
    onMove: () => read(),
  })
  // Two sliders stand side by side: neither may hold the other.
  const handle = document.createElement('div')
  handle.className = 'cw-map-position'
  element.append(handle)
  const marker = nowMarker(plot.u, handle, (position) => restWords(map, position))

  function rowsOf(heightPx: number): Columns {
    return axisColumns(currentSet().sampleRate, heightPx)
  }

  function request(fine: boolean): MapRequest {
    const set = currentSet()
    if (!fine) return { set, rows: axisColumns(set.sampleRate, rows.count / COARSE.rowPx), positions: COARSE.positions }
    return { set, rows, positions: Math.max(COARSE.positions, Math.min(MOST_POSITIONS, Math.round(size.widthPx / CELL_PX))) }
  }

  /** What is computed for an older set gives way; a coarse one is finished, so that a gesture sees something. */
  function ask() {
    clearTimeout(rest)
    if (asked === 'whole') feed.stop()
    asked = 'coarse'
    feed.ask(request(false))
  }

  function askWhole() {
    asked = 'whole'
    feed.ask(request(true))
  }

  function read() {
    const held = useView.getState().held === null ? '' : ' · held'
    const part = hair.part()
    const position = across ?? shownPosition()
    reading(
      part === null
        ? `${restWords(map, shownPosition())}${held}`
        : placeWords(currentSet(), map, channel, { position, hz: frequencyAt(rows, part) }),
    )
  }

  function frame() {
    const position = shownPosition()
    if (position === placed) return
    placed = position
    line.changed()
    const hz = map && !age.isStale() ? firstNotchAt(map, position) : null
    marker.place(position * size.widthPx, hz === null ? null : (1 - partOf(rows, hz)) * size.heightPx)
  }

  const age = staleness(() => plot.redraw())
  const line = readingLine(read)
  const stopFrames = onFrame(frame)
  const stopView = useView.subscribe(line.changed)
  const stopSet = subscribeSet(() => {
    rows = rowsOf(size.heightPx)
    ask()
  })
  ask()

  return {
    summary: () => (map ? mapSummary(map) : COMPUTED),
    table: () => (map ? mapTable(map) : { caption: COMPUTED, head: [], rows: [] }),
    numbers: () => (map ? mapNumbers(map, shownSet.sweep.startPhase) : { head: [], columns: [] }),
    picture: plot.picture,
    destroy() {
      clearTimeout(rest)
      stopFrames()
      stopView()
      stopSet()
      line.stop()
      age.stop()
      feed.stop()
      choice.destroy()
      hair.destroy()
      marker.destroy()
      handle.remove()
      plot.destroy()
    },
  }
}

interface Picture {
  readonly theme: PlotTheme
  readonly cells: HTMLCanvasElement
  readonly scale: HTMLCanvasElement
}
