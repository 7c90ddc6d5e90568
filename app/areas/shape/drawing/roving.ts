import { LOOP_BLOCKS, MAIN_BLOCKS, type PathBlockId } from './blocks.ts'

/** Down from the path goes to the loop and up goes back, each to the block drawn nearest. */
const BELOW: Readonly<Partial<Record<PathBlockId, PathBlockId>>> = { inputShaper: 'feedback', line: 'loopShaper', voices: 'damping' }
const ABOVE: Readonly<Partial<Record<PathBlockId, PathBlockId>>> = {
  feedback: 'line',
  loopShaper: 'line',
  lowCut: 'line',
  damping: 'line',
}

/** The block an arrow, Home or End leads to from another; null for other keys and at the ends. */
export function neighbour(from: PathBlockId, key: string): PathBlockId | null {
  const row = MAIN_BLOCKS.includes(from) ? MAIN_BLOCKS : LOOP_BLOCKS
  const at = row.indexOf(from)
  switch (key) {
    case 'ArrowRight':
      return row[at + 1] ?? null
    case 'ArrowLeft':
      return row[at - 1] ?? null
    case 'ArrowDown':
      return BELOW[from] ?? null
    case 'ArrowUp':
      return ABOVE[from] ?? null
    case 'Home':
      return row[0] ?? null
    case 'End':
      return row.at(-1) ?? null
    default:
      return null
  }
}
