/** Numerical Recipes' 32-bit linear congruential generator, scaled to [−0.5, 0.5): the noise that tests/outside/dsp_path.py makes. */
export function noise(seed: number, frames: number): Float64Array {
  let state = seed
  return Float64Array.from({ length: frames }, () => {
    state = (Math.imul(1664525, state) + 1013904223) >>> 0
    return state / 2 ** 32 - 0.5
  })
}
