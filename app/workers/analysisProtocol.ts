// What the page may ask of the analysis workers, and in which of the two each kind runs.
import type { ChecksReply, ChecksRequest } from './analysisJobs/checks.ts'
import type { Reach, ReachRequest } from './analysisJobs/reach.ts'
import type { Trace, TraceRequest } from './analysisJobs/trace.ts'

export interface Jobs {
  /** The response at one sweep position. */
  readonly trace: { readonly request: TraceRequest; readonly reply: Trace }
  /** Everything the response reaches over the sweep. */
  readonly reach: { readonly request: ReachRequest; readonly reply: Reach }
  readonly checks: { readonly request: ChecksRequest; readonly reply: ChecksReply }
}

export type JobKind = keyof Jobs
export type JobRequest<K extends JobKind> = Jobs[K]['request']
export type JobReply<K extends JobKind> = Jobs[K]['reply']

export type Lane = 'live' | 'slow'

export const LANE: Readonly<Record<JobKind, Lane>> = { trace: 'live', reach: 'slow', checks: 'slow' }
