// "Checks · 1 fails, 1 near, 6 hold · 3 to come": what the heading of the checks says.
import { useChecks } from '../../../state/checks.ts'
import { useVerdict, type VerdictState } from '../../../state/verdict.ts'

export function verdictWords({ verdict, fails, near, notes, holds, pending }: VerdictState): string {
  if (verdict === null) return 'Checks · being computed'
  const parts = [
    fails > 0 ? `${fails} ${fails === 1 ? 'fails' : 'fail'}` : '',
    near > 0 ? `${near} near` : '',
    notes > 0 ? `${notes} ${notes === 1 ? 'note' : 'notes'}` : '',
    holds > 0 ? `${holds} ${holds === 1 ? 'holds' : 'hold'}` : '',
  ]
  return `Checks · ${parts.filter((part) => part !== '').join(', ')}${pending > 0 ? ` · ${pending} to come` : ''}`
}

export function useVerdictWords(): string {
  const words = useVerdict(verdictWords)
  const problem = useChecks((state) => state.problem)
  return problem === null ? words : 'Checks · not computed'
}
