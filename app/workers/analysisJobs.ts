// Every kind of analysis job with the function that does it.
import { checksJob } from './analysisJobs/checks.ts'
import { loopJob, loopReachJob } from './analysisJobs/loop.ts'
import { reachJob } from './analysisJobs/reach.ts'
import { traceJob } from './analysisJobs/trace.ts'
import type { JobKind, JobReply, JobRequest } from './analysisProtocol.ts'
import type { SlicedJob } from './analysisRunner.ts'

export const ANALYSIS_JOBS: { readonly [K in JobKind]: SlicedJob<JobRequest<K>, JobReply<K>> } = {
  trace: traceJob,
  reach: reachJob,
  loop: loopJob,
  loopReach: loopReachJob,
  checks: checksJob,
}
