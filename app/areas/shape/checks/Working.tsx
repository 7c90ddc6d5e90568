// A check's working: each step's formula, the numbers put in, the result, where the formula is from.
import type { WorkingStep } from '../../../../src/checks/types.ts'

interface WorkingProps {
  readonly id: string
  readonly label: string
  readonly steps: readonly WorkingStep[]
}

export function Working({ id, label, steps }: WorkingProps) {
  return (
    <section className="cw-check-box cw-working" id={id} aria-label={`Working: ${label}`}>
      <ol>
        {steps.map(({ formula, numbers, result, source }) => (
          <li key={`${formula} ${numbers}`}>
            <p className="cw-working-formula">{formula}</p>
            {numbers === '' ? null : <p>{numbers}</p>}
            <p className="cw-working-result">= {result}</p>
            {source === '' ? null : <p className="cw-working-source">{source}</p>}
          </li>
        ))}
      </ol>
    </section>
  )
}
