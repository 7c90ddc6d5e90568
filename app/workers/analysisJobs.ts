// Every kind of analysis job with the function that does it, or with the way to fetch it where the page's first load can do without.
import { movesAnything } from '../../src/checks/panelBoxScope.ts'
import { checksJob } from './analysisJobs/checks.ts'
import { loopJob, loopReachJob } from './analysisJobs/loop.ts'
import { reachJob } from './analysisJobs/reach.ts'
import { traceJob } from './analysisJobs/trace.ts'
import type { JobKind, JobProgress, JobReply, JobRequest } from './analysisProtocol.ts'
import type { FetchedJob, SlicedJob } from './analysisRunner.ts'

type Job<K extends JobKind> = SlicedJob<JobRequest<K>, JobReply<K>, JobProgress<K>> | FetchedJob<JobRequest<K>, JobReply<K>, JobProgress<K>>

export const ANALYSIS_JOBS: { readonly [K in JobKind]: Job<K> } = {
  trace: traceJob,
  reach: reachJob,
  loop: loopJob,
  loopReach: loopReachJob,
  map: { fetch: async () => (await import('./analysisJobs/map.ts')).mapJob },
  checks: checksJob,
  longChecks: {
    part: ({ set }) => (movesAnything(set) ? 'panel' : ''),
    fetch: async ({ set }) =>
      movesAnything(set)
        ? (await import('./analysisJobs/panelChecks.ts')).longChecksJob
        : (await import('./analysisJobs/longChecks.ts')).noPanelJob,
  },
  rates: { fetch: async () => (await import('./analysisJobs/rates.ts')).ratesJob },
}
