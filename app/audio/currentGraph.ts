// The graph that sounds, if any: one place, so that everything which sends to it need not know who made it.
import type { Graph } from './graph.ts'

let current: Graph | null = null

export const currentGraph = (): Graph | null => current

export function setCurrentGraph(graph: Graph | null): void {
  current = graph
}
