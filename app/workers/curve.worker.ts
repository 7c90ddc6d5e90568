// Entry of the Curve plot's worker, started when that plot is first shown.
import { type CurveRequest, curveJob } from './curveJob.ts'

interface Scope {
  postMessage(message: unknown): void
  onmessage: ((event: MessageEvent<CurveRequest>) => void) | null
}

const scope = self as unknown as Scope

scope.onmessage = ({ data }) => scope.postMessage(curveJob(data))
