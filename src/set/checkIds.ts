// The checks by name, in the order they are listed, and which of them a set's `limits` may set a limit for: those that hold a figure against a number. The set layer
// knows no more of them; what they judge stands in src/checks/limits.ts, keyed by this table.

const CHECKS = {
  'loop.stability': false,
  'loop.margin': true,
  'loop.poles': false,
  'loop.ring': true,
  'response.extremes': false,
  'sweep.range': false,
  'sweep.detune': true,
  'sweep.fusion': true,
  'sweep.steps': true,
  'tone.droop': false,
  'level.peak': true,
  'level.line': true,
  'level.dc': true,
  'level.loudness': false,
  'level.mono': true,
  'shaper.harmonics': false,
  'shaper.alias': true,
  'number.noise': true,
  'number.limitCycle': true,
  'number.saturation': false,
  'target.ram': true,
  'target.flash': true,
  'target.load': true,
  'panel.box': false,
} as const

export type CheckId = keyof typeof CHECKS
export type LimitableId = { [Id in CheckId]: (typeof CHECKS)[Id] extends true ? Id : never }[CheckId]

export const CHECK_IDS = Object.keys(CHECKS) as readonly CheckId[]
export const LIMITABLE_IDS = CHECK_IDS.filter((id) => CHECKS[id]) as readonly LimitableId[]
