// What the page may ask of the analysis workers, and in which of the two each kind runs.
import type { ChecksReply, ChecksRequest } from './analysisJobs/checks.ts'
import type { LoopReach, LoopReachRequest, LoopRequest, LoopTrace } from './analysisJobs/loop.ts'
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
  readonly checks: { readonly request: ChecksRequest; readonly reply: ChecksReply }
}

export type JobKind = keyof Jobs
export type JobRequest<K extends JobKind> = Jobs[K]['request']
export type JobReply<K extends JobKind> = Jobs[K]['reply']

export type Lane = 'live' | 'slow'

export const LANE: Readonly<Record<JobKind, Lane>> = { trace: 'live', reach: 'slow', loop: 'live', loopReach: 'slow', checks: 'slow' }
