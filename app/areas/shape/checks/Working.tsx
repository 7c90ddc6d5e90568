// A check's working: each step's formula, the numbers put in, the result, where the formula is from.
import type { WorkingStep } from '../../../../src/checks/types.ts'

export function Working({ steps }: { readonly steps: readonly WorkingStep[] }) {
  return (
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
  )
}
