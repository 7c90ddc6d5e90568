// Which shaper the Curve plot shows: that of the block whose fields are open, else the first in the path.
import { type PresentShaper, shapersOf } from '../../../src/checks/shaperFigures.ts'
import type { ParameterSet } from '../../../src/set/types.ts'
import type { BlockId } from '../../state/view.ts'

const BLOCKS: Readonly<Record<PresentShaper['path'], BlockId>> = {
  'input.shaper': 'inputShaper',
  'loop.shaper': 'loopShaper',
  'mix.shaper': 'outputShaper',
}

export function chosenShaper(set: ParameterSet, block: BlockId): PresentShaper | null {
  const present = shapersOf(set)
  return present.find(({ path }) => BLOCKS[path] === block) ?? present[0] ?? null
}
