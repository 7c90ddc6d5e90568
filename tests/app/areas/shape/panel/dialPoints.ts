/** The first and the last pair of numbers of a path's data. */
export function dialPathPoints(data: string): readonly [readonly [number, number], readonly [number, number]] {
  const numbers = data.match(/-?\d+(?:\.\d+)?/g)?.map(Number) ?? []
  return [numbers.slice(0, 2) as [number, number], numbers.slice(-2) as [number, number]]
}
