// What the map says: its legend, under the cursor, at rest, in one sentence, as a table and as numbers.
import type { ParameterSet } from '../../../src/set/types.ts'
import type { SweepMap } from '../../workers/analysisJobs/map.ts'
import type { Track } from '../../workers/analysisJobs/mapTracks.ts'
import { frequencyAt, partOf } from '../columns.ts'
import type { PlotNumbers, PlotTable } from '../plotTypes.ts'
import { levelsAt } from '../response/responseWords.ts'
import { decibel, decimal, hertz, noteWords } from '../words.ts'
import { highestOf, lowestOf } from './drawMap.ts'
import { cellSpan } from './mapPicture.ts'

export function mapLegend({ meanFromHz, stands, drifts, smallSignal, tracks }: SweepMap): string {
  const parts: string[] = []
  if (smallSignal) parts.push('for small signals')
  if (stands) parts.push('the sweep stands still')
  else if (drifts) parts.push('drift stands as a sine')
  if (tracks.length > 0) parts.push('solid: notches · dashed: peaks')
  if (meanFromHz !== null) parts.push(`above ${hertz(meanFromHz)} Hz: mean power of each cell`)
  return parts.join(' · ')
}

export interface MapPlace {
  readonly position: number
  readonly hz: number
}

/** "position 0.38 · 1 268 Hz · −9.8 dB · D♯6 +33 ct", exactly there; where cells hold means, that of the cell beside it. */
export function placeWords(set: ParameterSet, map: SweepMap | null, channel: number, { position, hz }: MapPlace): string {
  const level = levelsAt(set, map?.stands ? set.sweep.startPhase : position, hz)[channel] ?? Number.NaN
  const mean = map && map.meanFromHz !== null && hz >= map.meanFromHz ? ` (mean ${decibel(cellAt(map, channel, { position, hz }))})` : ''
  return `position ${decimal(position, 2)} · ${hertz(hz)} Hz · ${decibel(level)}${mean} · ${noteWords(hz)}`
}

/** Level of the cell that holds a place, dB. */
export function cellAt({ positions, rows, channels }: SweepMap, channel: number, { position, hz }: MapPlace): number {
  const i = Math.max(0, Math.min(positions - 1, Math.floor(position * positions)))
  const r = Math.max(0, Math.min(rows.count - 1, Math.floor(partOf(rows, hz) * rows.count)))
  return channels[channel]?.[i * rows.count + r] ?? Number.NaN
}

/** "position 0.38 · first notch 97 Hz" */
export function restWords(map: SweepMap | null, position: number): string {
  const place = `position ${decimal(position, 2)}`
  if (!map) return place
  const hz = firstNotchAt(map, position)
  return `${place} · ${hz === null ? 'no notch' : `first notch ${hertz(hz)} Hz`}`
}

/** The lowest notch at a position, between the positions its track was computed at; null where there is none. */
export function firstNotchAt({ tracks }: SweepMap, position: number): number | null {
  let first: number | null = null
  for (const { kind, frequencyHz } of tracks) {
    const at = position * (frequencyHz.length - 1)
    const j = Math.min(Math.floor(at), frequencyHz.length - 2)
    const [before, after] = [frequencyHz[j] as number, frequencyHz[j + 1] as number]
    const hz = before * (after / before) ** (at - j)
    if (kind === 'notch' && hz < (first ?? Number.POSITIVE_INFINITY)) first = hz
  }
  return first
}

export function mapSummary(map: SweepMap): string {
  const { rows, stands, channels } = map
  const levels = cellSpan(channels)
  const what = stands ? 'the sweep stands still: one response' : 'level over sweep position and frequency'
  const first = (kind: Track['kind']) => {
    const track = map.tracks.find((one) => one.kind === kind)
    return track ? [`first ${kind} ${rangeWords(track)}`] : []
  }
  const parts = [`${decibel(levels.low)} to ${decibel(levels.high)}`, ...first('notch'), ...first('peak')]
  return `Map: ${what}, ${hertz(rows.lowHz)} Hz to ${hertz(rows.highHz)} Hz; ${parts.join('; ')}.`
}

function rangeWords(track: Track): string {
  const [low, high] = [lowestOf(track), highestOf(track)]
  if (!low || !high) return 'none'
  return hertz(low.hz) === hertz(high.hz) ? `${hertz(low.hz)} Hz` : `${hertz(low.hz)} to ${hertz(high.hz)} Hz`
}

/** The tracks: from where to where each notch and peak runs, and where in the cycle. */
export function mapTable(map: SweepMap): PlotTable {
  const names = { notch: 'Notch', peak: 'Peak' } as const
  return {
    caption: map.stands
      ? 'First notches and peaks; the sweep stands still'
      : 'First notches and peaks over the sweep, of the first channel',
    head: ['Track', 'Lowest', 'Level there', 'At position', 'Highest', 'Level there ', 'At position ', 'Present'],
    rows: map.tracks.map((track, i) => {
      const order = i + 1 - map.tracks.findIndex(({ kind }) => kind === track.kind)
      const end = (found: ReturnType<typeof lowestOf>) =>
        found
          ? [
              `${hertz(found.hz)} Hz`,
              decibel(track.db[found.j] as number),
              map.stands ? 'everywhere' : decimal(found.j / (track.frequencyHz.length - 1), 2),
            ]
          : ['', '', '']
      const present = track.frequencyHz.filter((hz) => !Number.isNaN(hz)).length / track.frequencyHz.length
      return [
        `${names[track.kind]} ${order}`,
        ...end(lowestOf(track)),
        ...end(highestOf(track)),
        present === 1 ? 'always' : `${decimal(100 * present, 0)} % of the cycle`,
      ]
    }),
  }
}

/** A line a cell: its middle position, the edges of its row, its level in every channel. */
export function mapNumbers({ positions, rows, channels, stands }: SweepMap, startPhase: number): PlotNumbers {
  const length = positions * rows.count
  const column = (value: (i: number, r: number) => number) =>
    Float64Array.from({ length }, (_, k) => value(Math.floor(k / rows.count), k % rows.count))
  return {
    head: ['position', 'low_hz', 'high_hz', ...channels.map((_, c) => (channels.length === 1 ? 'level_db' : `channel_${c + 1}_db`))],
    columns: [
      column((i) => (stands ? startPhase : (i + 0.5) / positions)),
      column((_, r) => frequencyAt(rows, r / rows.count)),
      column((_, r) => frequencyAt(rows, (r + 1) / rows.count)),
      ...channels,
    ],
  }
}
