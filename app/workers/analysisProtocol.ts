// What the page may ask of the analysis workers, and in which of the three each kind runs.
import type { ChecksReply, ChecksRequest } from './analysisJobs/checks.ts'
import type { LongChecksProgress, LongChecksReply, LongChecksRequest } from './analysisJobs/longChecks.ts'
import type { LoopReach, LoopReachRequest, LoopRequest, LoopTrace } from './analysisJobs/loop.ts'
import type { MapRequest, SweepMap } from './analysisJobs/map.ts'
import type { RatesProgress, RatesReply, RatesRequest } from './analysisJobs/rates.ts'
import type { Reach, ReachRequest } from './analysisJobs/reach.ts'
import type { Trace, TraceRequest } from './analysisJobs/trace.ts'

export interface Jobs {
  /** The response at one sweep position. */
  readonly trace: { readonly request: TraceRequest; readonly reply: Trace }
  /** Everything the response reaches over the sweep. */
  readonly reach: { readonly request: ReachRequest; readonly reply: Reach }
  /** The open loop at one sweep position, with poles. */
  readonly loop: { readonly request: LoopRequest; readonly reply: LoopTrace }
  /** The open loop wherever the sweep can stand. */
  readonly loopReach: { readonly request: LoopReachRequest; readonly reply: LoopReach }
  /** The response over the whole sweep as a picture. */
  readonly map: { readonly request: MapRequest; readonly reply: SweepMap }
  /** The checks that follow from formulas. */
  readonly checks: { readonly request: ChecksRequest; readonly reply: ChecksReply }
  /** The checks that take rendering, and the panel's box. */
  readonly longChecks: { readonly request: LongChecksRequest; readonly reply: LongChecksReply; readonly progress: LongChecksProgress }
  /** The checks at other sample rates. */
  readonly rates: { readonly request: RatesRequest; readonly reply: RatesReply; readonly progress: RatesProgress }
}

export type JobKind = keyof Jobs
export type JobRequest<K extends JobKind> = Jobs[K]['request']
export type JobReply<K extends JobKind> = Jobs[K]['reply']

export type JobProgress<K extends JobKind> = Jobs[K] extends { readonly progress: infer P } ? P : never

/** `live` answers within a frame; `slow` within some; `long` takes up to seconds, tells how far it is and is dropped for a newer request. */
export type Lane = 'live' | 'slow' | 'long'

export const LANE: Readonly<Record<JobKind, Lane>> = {
  trace: 'live',
  reach: 'slow',
  loop: 'live',
  loopReach: 'slow',
  map: 'slow',
  checks: 'slow',
  longChecks: 'long',
  rates: 'long',
}
