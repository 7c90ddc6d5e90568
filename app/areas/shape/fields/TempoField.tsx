import { useMemo } from 'react'
import type { Binding } from '../../../fields/binding.ts'
import { NumberField } from '../../../fields/NumberField.tsx'
import type { NumberSpec } from '../../../fields/quantity.ts'
import { useView } from '../../../state/view.ts'

const TEMPO: NumberSpec = {
  kind: 'number',
  label: 'Tempo for beats',
  help: 'Beats a minute at which a rate or time typed as part of a whole note is read, and cycles are counted. Not part of the set.',
  unit: '',
  min: 20,
  max: 400,
  taper: 'linear',
  trackMin: 40,
  trackMax: 220,
}

/** The tempo is how the page is looked at, not the set: it has no history. */
export function TempoField() {
  const tempo = useView((s) => s.tempoBpm)
  const binding = useMemo((): Binding<number | null> => {
    const put = (value: number | null) => {
      if (value === null || value < TEMPO.min || value > TEMPO.max) return { why: 'Tempo takes 20 to 400 beats a minute', ways: [] }
      useView.setState({ tempoBpm: Number(value.toFixed(2)) })
      return null
    }
    return {
      value: tempo,
      attempt: (value) => put(value)?.why ?? null,
      settle: () => {},
      drop: () => {},
      apply: put,
    }
  }, [tempo])
  return <NumberField spec={TEMPO} binding={binding} />
}
