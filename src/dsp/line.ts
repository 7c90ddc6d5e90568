// The lines: what both cores of an engine write and read, one piece of memory a channel in which the writing walks up. Its last part is also
// written at its start, a batch at a time, so that at the end the writing goes on from there with everything still needed behind it: no read
// or write ever wraps, and no sample of work is left for one moment.
//
// w[c]: [ … samples still needed | written later … ], `position` is where the next sample goes.
// Invariant: w[n − i] = w[c][position − i] for 1 ≤ i ≤ length, with `position` that of n; and of the samples from `shift` up, those below
// `moved` stand `shift` lower too, shift = memory − length.

/**
 * Most samples processed between two looks at what moves; cuts never change a result. Also how often a live engine looks for values that have
 * nearly died: what decays slowly does not come near denormal numbers in between, and what decays fast is through them at once.
 */
export const CHUNK = 1024

export type Pair = readonly [Float64Array, Float64Array]

export const pair = (length: number): Pair => [new Float64Array(length), new Float64Array(length)]

export interface Lines {
  /** Samples kept. */
  readonly length: number
  readonly w: Pair
  /**
   * u of each line: sample j of the chunk is u[c][uAt + j]. Where the dry path may be delayed u is kept as w is, and uAt is `position`; else
   * there is only the chunk, and uAt is 0.
   */
  readonly u: Pair
  uAt: number
  readonly keepsInput: boolean
  position: number
  moved: number
}

/** Lines for delays up to `maxDelay` samples: a cubic's oldest point is two further. */
export function createLines(maxDelay: number, keepsInput: boolean): Lines {
  const length = (Math.ceil(maxDelay) | 0) + 4
  const memory = length + Math.max(length, 4 * CHUNK)
  return {
    length,
    w: pair(memory),
    u: pair(keepsInput ? memory : CHUNK),
    uAt: keepsInput ? length : 0,
    keepsInput,
    position: length,
    moved: memory - length,
  }
}

/** Moves on by n samples; `count` lines are in use. */
export function advanceLines(lines: Lines, n: number, count: number): void {
  const { length, w, u, keepsInput } = lines
  const memory = w[0].length
  const shift = memory - length
  lines.position += n
  const { position, moved } = lines
  if (position - moved >= CHUNK || position === memory) {
    for (let c = 0; c < count; c++) {
      w[c]!.copyWithin(moved - shift, moved, position)
      if (keepsInput) u[c]!.copyWithin(moved - shift, moved, position)
    }
    lines.moved = position
  }
  if (position === memory) {
    lines.position = length
    lines.moved = shift
  }
  if (keepsInput) lines.uAt = lines.position
}

/** Silence. */
export function clearLines(lines: Lines): void {
  const { length, w, u, keepsInput } = lines
  lines.position = length
  lines.moved = w[0].length - length
  if (keepsInput) lines.uAt = length
  for (let c = 0; c < 2; c++) {
    w[c]!.fill(0, 0, length)
    u[c]!.fill(0, 0, Math.min(length, u[c]!.length))
  }
}

/** The n samples at hand of line 0 to line 1 too: in a live engine of one line, so that a layout of two finds its past. */
export function shareLine({ w, u, position }: Lines, n: number): void {
  for (let i = position; i < position + n; i++) {
    w[1][i] = w[0][i]!
    u[1][i] = u[0][i]!
  }
}

/**
 * Sets the last CHUNK samples of each line to 0 where they are smaller than `least`, if the last of them is: a line that sounds is left in peace.
 */
export function flushLines(lines: Lines, least: number): void {
  for (let c = 0; c < 2; c++) if (Math.abs(lines.w[c]![lines.position - 1]!) < least) flushLine(lines, c, least)
}

function flushLine({ w, position, moved, length }: Lines, c: number, least: number): void {
  const line = w[c]!
  const shift = line.length - length
  for (let i = Math.max(0, position - CHUNK); i < position; i++) {
    if (Math.abs(line[i]!) >= least) continue
    line[i] = 0
    if (i >= shift && i < moved) line[i - shift] = 0
  }
}
