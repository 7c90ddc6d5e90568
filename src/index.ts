// The library, by task. Names only: each is documented where it is made. Files and texts from outside come back as a Result with reasons;
// everything else throws RangeError for what is out of range. No DOM, no Node.

// Read, write and make sets

/** An effect the table's defaults describe; a shaper of one curve. */
export { defaultSet, defaultShaper } from './set/defaults.ts'
/** The demo sets: what each is for, and its file under public/. */
export { DEMO_SETS, type DemoSet } from './set/demoSets.ts'
/** A playable beginning for an intent, with a panel. */
export { startingSet } from './set/intents.ts'
/** JSON or text in; a complete and valid set out, or every reason why not. */
export { parseSet } from './set/parse.ts'
/** One field by its path ("loop.feedback"): look, or a copy with another value. */
export { getAt, withAt } from './set/path.ts'
export { readSet } from './set/read.ts'
export type { Problem, Result } from './set/result.ts'
export type * from './set/types.ts'
/** What is wrong between the fields of a set, at its own rate or another. */
export { setProblems } from './set/validity.ts'
/** The text of a set's file: the same set, the same text. */
export { writeSet } from './set/write.ts'

// Parameters, units, knobs

/** What a knob's position makes of a parameter, and the way back; the whole set with a knob turned; a knob for a field. */
export { knobDisagreements, knobForField, movePosition, moveValue, steppedPosition, turnKnob } from './set/panel.ts'
/** The table of every parameter: range, unit, default, label, help, C name. */
export { PARAMETERS, type Parameter, parameter } from './set/parameters.ts'
/** "2.5ms", "-6 dB", "1/8 @ 96", "A3" to a number, and a number to text. */
export { formatQuantity, parseQuantity, type QuantityContext } from './set/units.ts'
/** What sets of an intent usually hold in a field, with its source. */
export { type UsualRange, usualRange } from './set/usualRanges.ts'

// Play

/** The signal path block by block, with live changes: made once, then without allocation. */
export {
  type BypassMode,
  createEngine,
  type DelayChange,
  type Engine,
  type EngineCounters,
  type EngineOptions,
  engineCounters,
  holdPosition,
  inputChannels,
  outputChannels,
  processEngine,
  resetEngine,
  retargetEngine,
  setBypass,
  setDelayChange,
  sweepPosition,
} from './dsp/engine.ts'
/** The whole of a signal at once, the same bits every time. */
export { type RenderOptions, renderSet } from './dsp/render.ts'
/** A set as the one array of numbers that an engine is retargeted with. */
export { FLAT_LENGTH, flatten } from './set/flat.ts'

// Measure the response

/** Least and most of a held sweep inside each column of a plot. */
export { bandEnvelope, logBandEdges } from './analysis/bandEnvelope.ts'
/** Everything the response reaches over the sweep, at single frequencies. */
export { type ChannelEnvelope, sweepEnvelope } from './analysis/envelope.ts'
/** Every notch and peak of a held sweep. */
export { type Extreme, type ExtremeKind, frozenExtremes } from './analysis/extremes.ts'
/** The first notch or peak: where it is, and from where to where it moves. */
export { type FirstExtremeRange, firstExtreme, firstExtremeRange } from './analysis/firstExtreme.ts'
/** A set held at a sweep position: what the next ones measure. */
export { type Frozen, freeze } from './analysis/frozen.ts'
/** Level, phase and group delay of a held sweep. */
export { type ChannelResponse, frozenResponse } from './analysis/response.ts'
/** Base and depth that move the first notch or peak from one frequency to another. */
export { type SolvedSweep, solveFirstExtremes } from './analysis/solveFirstExtremes.ts'

// Measure the sweep

/** What interpolator and update interval add to the wet signal, against a windowed-sinc read of the true delay: overall, per octave, and whose fault. */
export type { ArtefactBand, ArtefactLevels } from './analysis/artefactLevels.ts'
export { type Artefacts, artefactSteps, artefacts } from './analysis/artefacts.ts'
/** Largest bend of pitch, up and down. */
export { type SweepDetune, sweepDetune } from './analysis/detune.ts'
/** Treble lost by interpolating, at worst over the sweep. */
export { type Droop, droop, type ReadDroop } from './analysis/droop.ts'
/** Delay and cents of every voice over the cycle. */
export { type SweepTable, sweepTable } from './analysis/sweepTable.ts'
/** Smallest and largest delay, against what the reads can do. */
export { type DelayRange, delayRange } from './set/delayRange.ts'

// Measure the loop

/** Gain once round, over frequency. */
export { type LoopGainCurve, loopGain } from './analysis/loopGain.ts'
/** Largest pole with its ring time; every resonance. */
export { type LargestPole, largestPole, type Resonance, resonances } from './analysis/poles.ts'
/** The five words: proven, computed, frozen, bounded, diverges. */
export { type Stability, type StabilityWord, stability } from './analysis/stability.ts'

// Measure levels

/** DC that uneven shapers leave of a tone. */
export { type DcFigures, dcSteps } from './analysis/dc.ts'
/** Worst gain over frequency and sweep at the output and in the line, worst sample, and what shapers hold. */
export { type LevelFigure, type LevelFigures, levelFigures } from './analysis/levels.ts'
/** Loudness against the bypass. */
export { type LoudnessFigures, loudnessSteps } from './analysis/levelsLoudness.ts'
/** What the sum of both outputs loses. */
export { type MonoLoss, monoLoss } from './analysis/mono.ts'

// Judge

/** Every check with figure, limit and working; the worst of them as one word. */
export { runChecks, verdictOf } from './checks/registry.ts'
export type { Check, CheckValue, Mend, Status, Verdict, WorkingStep } from './checks/types.ts'

// Sound to try it on

/** Built-in phrases of our own synthesis, which repeat without a seam. */
export { PHRASES, type PhraseId, type PhraseInfo } from './material/phraseList.ts'
export { phrase } from './material/phrases.ts'
/** WAV bytes to samples and back. */
export { readWav, type WavAudio, writeWav } from './media/wav.ts'
/** Peak, rms and decibels. */
export { fromDb, peak, rms, toDb } from './signal/levels.ts'
/** Loudness by ITU-R BS.1770. */
export { integratedLoudness } from './signal/loudness.ts'
/** Samples at another rate. */
export { resampleTo } from './signal/resample.ts'
