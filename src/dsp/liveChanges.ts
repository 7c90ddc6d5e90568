// Changes while audio runs. Gains, filters and the sweep's speed ramp inside the sounding core; delays glide there or, if so chosen,
// cross-fade; layout, interpolators, curves, voices and the dry path's place cross-fade. One cross-fade at a time: what comes during one
// waits, the latest winning. Nothing here throws or allocates.
import { aimBypass, type BypassMode, pathIsSilent } from './bypass.ts'
import { type Core, copyStates, fitStates, loadCore } from './core.ts'
import type { DelayChange, Engine } from './engineState.ts'
import { acceptFlat, DELAY, GAIN, RATE, STRUCTURE } from './flatRules.ts'
import { setTargets } from './gains.ts'
import { aimRamps, holdRamps } from './ramps.ts'
import { takeDelays } from './settings.ts'
import { glideFrom, holdPhase, jump, keepPhase, noteDelays, startPhase } from './trajectory.ts'

/**
 * Edits the set at the next sample: `flat` in the layout of src/set/flat.ts. Values out of range, of unknown choices or NaN where that says
 * nothing keep their old value and are counted as refused. The sample rate is not followed: an engine runs at the rate it was made for.
 */
export function retargetEngine(engine: Engine, flat: Float64Array): void {
  const { acceptance, counters, core } = engine
  acceptFlat(engine.accepted, flat, acceptance)
  counters.refusedValues += acceptance.refused
  const { changed } = acceptance
  if (changed === 0) return
  if (unheard(engine)) {
    loadAtOnce(engine)
    return
  }
  const fade = (changed & STRUCTURE) !== 0 || ((changed & DELAY) !== 0 && engine.delayChange === 'crossfade')
  if (fade && !engine.fading && engine.idle) {
    beginFade(engine, engine.idle)
    return
  }
  if (changed & GAIN) aimCores(engine)
  if (fade) engine.pending = true
  else if (changed & (DELAY | RATE) && !engine.pending) glideDelays(engine, core)
}

/** Chooses how delay changes are made from now on. */
export function setDelayChange(engine: Engine, how: DelayChange): void {
  engine.delayChange = how
}

/** Switches bypass, fading over 20 ms. */
export function setBypass(engine: Engine, mode: BypassMode): void {
  if (mode === engine.bypass.mode) return
  aimBypass(engine.bypass, mode)
  aimCores(engine)
}

/** Stops the sweep at a position (cycles; its whole part is dropped), or with null lets it go on from there. Delays glide to it. */
export function holdPosition(engine: Engine, position: number | null): void {
  if (position !== null && !Number.isFinite(position)) return
  holdCore(engine, engine.core, position)
  if (engine.fading && engine.idle) holdCore(engine, engine.idle, position)
}

function holdCore({ n }: Engine, { trajectory, settings }: Core, position: number | null): void {
  noteDelays(trajectory, settings, n)
  holdPhase(trajectory, settings, n, position)
  if (n === 0) jump(trajectory, settings)
  else glideFrom(trajectory, settings, n, trajectory.noted)
}

/** Ends the cross-fade under way: the faded core is idle again, and what waited begins. */
export function endFade(engine: Engine): void {
  engine.fading = false
  if (engine.pending && engine.idle) {
    engine.pending = false
    beginFade(engine, engine.idle)
  }
}

/** Whether nothing sounds that a change could break: before the first sample, or behind a hard bypass. */
function unheard({ n, bypass, idle }: Engine): boolean {
  return n === 0 || idle === null || pathIsSilent(bypass)
}

/** Loads the accepted set into the sounding core at once, where nothing sounds that this could break. */
export function loadAtOnce({ core, accepted, bypass, n }: Engine): void {
  keepPhase(core.trajectory, core.settings, n, accepted)
  loadCore(core, accepted, bypass.inputOpen, bypass.dryOpen)
  if (n === 0 && !core.trajectory.held) startPhase(core.trajectory, core.settings)
}

/** Ramps every gain and filter of the cores that sound to the accepted set. */
function aimCores(engine: Engine): void {
  aimCore(engine, engine.core)
  if (engine.fading && engine.idle) aimCore(engine, engine.idle)
}

function aimCore({ accepted, fs, bypass }: Engine, { ramps }: Core): void {
  holdRamps(ramps)
  setTargets(ramps, accepted, fs, bypass.inputOpen, bypass.dryOpen)
  aimRamps(ramps)
}

function glideDelays({ accepted, n }: Engine, { trajectory, settings }: Core): void {
  noteDelays(trajectory, settings, n)
  keepPhase(trajectory, settings, n, accepted)
  takeDelays(settings, accepted)
  glideFrom(trajectory, settings, n, trajectory.noted)
}

/** Makes `next` the sounding core, with the accepted set and what the present one remembers, and fades the present one out. */
function beginFade(engine: Engine, next: Core): void {
  const { core, accepted, bypass, n } = engine
  noteDelays(core.trajectory, core.settings, n)
  copyStates(next, core)
  keepPhase(next.trajectory, core.settings, n, accepted)
  loadCore(next, accepted, bypass.inputOpen, bypass.dryOpen)
  fitStates(next, core.settings.lines, core.settings.outputs)
  if (engine.delayChange === 'glide') glideFrom(next.trajectory, next.settings, n, core.trajectory.noted)
  engine.core = next
  engine.idle = core
  engine.fading = true
  engine.fadeElapsed = 0
}
