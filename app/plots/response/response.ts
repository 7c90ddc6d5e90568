// Response: level against frequency at the position being shown, moving with the sound, before the wash of everything
// the sweep reaches; notch and peak marks; a cursor that reads frequency, level and note.
import { drawWash } from '../drawBand.ts'
import { type FrequencyPlotSpec, mountFrequencyPlot } from '../frequencyPlot.ts'
import { levelRange } from '../levels.ts'
import type { MountPlot } from '../plotTypes.ts'
import { drawResponse, responseLegend } from './drawResponse.ts'
import { responseNumbers, responseTable } from './responseTable.ts'
import { cursorWords, restWords, summaryWords } from './responseWords.ts'

const RESPONSE: FrequencyPlotSpec<'trace', 'reach'> = {
  live: 'trace',
  whole: 'reach',
  cursorLabel: 'Response at a frequency',
  levels(trace, reach) {
    const seen = reach ?? trace?.channels[0]
    return seen ? levelRange(Math.min(...seen.low), Math.max(...seen.high)) : levelRange(-18, 6)
  },
  drawWhole(surface, reach) {
    if (!reach.stands) drawWash(surface, reach)
  },
  drawLive: drawResponse,
  legend: responseLegend,
  cursorWords,
  restWords,
  summary: summaryWords,
  table: responseTable,
  numbers: responseNumbers,
}

export const mountResponse: MountPlot = (place) => mountFrequencyPlot(RESPONSE, place)
