/** Options of a choice from [value in the file, label] pairs. */
export const options = (...pairs: readonly (readonly [string, string])[]) => pairs.map(([value, label]) => ({ value, label }))

/** The five ways of reading between samples; voices and loop choose separately. */
export const interpolations = options(
  ['nearest', 'nearest'],
  ['linear', 'linear'],
  ['lagrange3', 'Lagrange 3'],
  ['hermite4', 'Hermite 4'],
  ['allpass1', 'all-pass 1'],
)
