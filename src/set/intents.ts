// Where a new set of each intent starts: plain, usual values (FACTS 2) and two or three knobs that agree with them.
import { defaultSet } from './defaults.ts'
import { movePosition } from './panel.ts'
import { getAt } from './path.ts'
import type { Intent, Knob, Move, ParameterSet } from './types.ts'

type Turn = readonly [name: string, parameter: string, min: number, max: number, taper: Move['taper']]

interface Start {
  readonly name: string
  readonly notes: string
  readonly layout?: ParameterSet['layout']
  readonly input?: Partial<ParameterSet['input']>
  readonly line?: Partial<ParameterSet['line']>
  readonly sweep?: Partial<ParameterSet['sweep']>
  readonly voices?: Partial<ParameterSet['voices']>
  readonly loop?: Partial<ParameterSet['loop']>
  readonly mix?: Partial<ParameterSet['mix']>
  readonly knobs: readonly Turn[]
}

const ONE_VOICE = { count: 1, spreadMs: 0 }
const SPEED: Turn = ['Speed', 'sweep.rateHz', 0.05, 5, 'log']

const STARTS: Readonly<Record<Intent, Start>> = {
  chorus: {
    name: 'New chorus',
    notes: 'Two voices half a cycle apart, a quarter of a cycle between the channels.',
    line: { baseMs: 10 },
    sweep: { rateHz: 0.5, depthMs: 2 },
    voices: { count: 2, spreadMs: 3 },
    knobs: [SPEED, ['Depth', 'sweep.depthMs', 0.2, 4, 'linear'], ['Wet', 'mix.wet', 0, 1, 'linear']],
  },
  flanger: {
    name: 'New flanger',
    notes: 'Dry and wet equal for the deepest notches, both channels in step, a linear loop that any movement leaves stable.',
    line: { baseMs: 1.5 },
    sweep: { rateHz: 0.2, depthMs: 1.2, stereoPhase: 0 },
    voices: ONE_VOICE,
    loop: { feedback: 0.5, dampingHz: 8000 },
    knobs: [
      ['Speed', 'sweep.rateHz', 0.05, 2, 'log'],
      ['Range', 'sweep.depthMs', 0, 1.4, 'linear'],
      ['Feedback', 'loop.feedback', 0, 0.7, 'linear'],
    ],
  },
  vibrato: {
    name: 'New vibrato',
    notes: 'No dry sound; base only as long as the depth needs.',
    layout: 'mono',
    line: { baseMs: 1.2 },
    sweep: { rateHz: 5, depthMs: 0.5, stereoPhase: 0 },
    voices: ONE_VOICE,
    mix: { dry: 0, wet: 1 },
    knobs: [
      ['Speed', 'sweep.rateHz', 1, 10, 'log'],
      ['Depth', 'sweep.depthMs', 0, 1, 'linear'],
    ],
  },
  doubler: {
    name: 'New doubler',
    notes: 'One drifting voice a side, late enough to be heard as a second player and too early to be an echo.',
    layout: 'monoToStereo',
    line: { baseMs: 22 },
    sweep: { shape: 'drift', rateHz: 0.7, depthMs: 2, stereoPhase: 180 },
    voices: ONE_VOICE,
    mix: { wetLowCutHz: 120 },
    knobs: [
      ['Lag', 'line.baseMs', 10, 40, 'log'],
      ['Drift', 'sweep.depthMs', 0, 5, 'linear'],
      ['Wet', 'mix.wet', 0, 1, 'linear'],
    ],
  },
  comb: {
    name: 'New comb',
    notes:
      'Stands still: peaks at multiples of 220 Hz, or close to it, which damping rounds off upwards. The input gain keeps them inside the line, the output gain gives it back.',
    layout: 'mono',
    input: { gainDb: -10 },
    line: { baseMs: 4.54 },
    sweep: { rateHz: 0, depthMs: 0, stereoPhase: 0 },
    voices: ONE_VOICE,
    loop: { feedback: 0.8, delay: 'fixed', interpolation: 'lagrange3', dampingHz: 8000 },
    mix: { dry: 0.7071, wet: 0.3, outputGainDb: 10 },
    knobs: [
      ['Pitch', 'line.baseMs', 20, 1, 'log'],
      ['Ring', 'loop.feedback', 0, 0.9, 'linear'],
    ],
  },
  other: {
    name: 'New set',
    notes: 'One voice at five milliseconds that moves a little: a place to start from.',
    line: { baseMs: 5 },
    sweep: { rateHz: 0.3, depthMs: 1 },
    voices: ONE_VOICE,
    knobs: [SPEED, ['Depth', 'sweep.depthMs', 0, 4, 'linear']],
  },
}

/** A new set of this intent: valid, playable, with a small panel standing where the values are. Fresh at every call. */
export function startingSet(intent: Intent): ParameterSet {
  const set = defaultSet()
  const { knobs, name, notes, layout = set.layout, ...groups } = STARTS[intent]
  const values: ParameterSet = {
    ...set,
    name,
    notes,
    intent,
    layout,
    input: { ...set.input, ...groups.input },
    line: { ...set.line, ...groups.line },
    sweep: { ...set.sweep, ...groups.sweep },
    voices: { ...set.voices, ...groups.voices },
    loop: { ...set.loop, ...groups.loop },
    mix: { ...set.mix, ...groups.mix },
  }
  return { ...values, panel: knobs.map((turn) => knobAt(values, turn)) }
}

function knobAt(set: ParameterSet, [knob, parameter, min, max, taper]: Turn): Knob {
  const move: Move = { parameter, min, max, taper, points: [] }
  const position = movePosition(move, getAt(set, parameter))
  if (position === null) throw new RangeError(`${parameter} must stand between ${min} and ${max}`)
  return { knob, position, steps: 0, smoothMs: 30, moves: [move] }
}
