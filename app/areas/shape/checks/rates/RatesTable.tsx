// Rows: the checks that another rate changes. Columns: the rates, the set's own marked.
import { STATUS_SIGN, STATUS_WORD } from '../../../../state/verdict.ts'
import { type ChangeRow, changesOf, ratesWith, rateWords } from './changes.ts'
import type { RatesState } from './useRates.ts'

export function RatesTable({ ownRate, rated, working, problem }: RatesState) {
  const rates = ratesWith(ownRate)
  const { rows, same } = changesOf(rated, ownRate)
  const words = working && `${rateWords(working.rate)}: ${Math.round(100 * working.part)} %`
  return (
    <>
      <div className="cw-rates-working">
        {working && (
          <progress
            className="cw-checks-progress"
            aria-label="Judging at other rates"
            aria-valuetext={words ?? ''}
            value={working.part}
            max={1}
          />
        )}
      </div>
      {problem && <p role="alert">The rates could not be judged: {problem}</p>}
      {/* biome-ignore lint/a11y/noNoninteractiveTabindex: a region that scrolls is reached by the keyboard */}
      <section className="cw-rates-scroll" aria-label="What changes" tabIndex={0}>
        <table>
          <thead>
            <tr>
              <th scope="col">Check</th>
              {rates.map((rate) => (
                <th key={rate} scope="col" data-own={rate === ownRate || undefined}>
                  {rateWords(rate)}
                  {rate === ownRate && <span className="cw-rates-own">the set’s</span>}
                </th>
              ))}
            </tr>
          </thead>
          <tbody>
            {rows.map((row) => (
              <Row key={row.id} row={row} rates={rates} ownRate={ownRate} pending={working !== null} />
            ))}
          </tbody>
        </table>
      </section>
      {rows.length === 0 && working === null && problem === null && <p>Nothing changes noticeably.</p>}
      {same.length > 0 && <p className="cw-rates-same">The same at every rate: {same.map(lower).join(', ')}.</p>}
    </>
  )
}

interface RowProps {
  readonly row: ChangeRow
  readonly rates: readonly number[]
  readonly ownRate: number
  readonly pending: boolean
}

function Row({ row, rates, ownRate, pending }: RowProps) {
  return (
    <tr>
      <th scope="row">{row.label}</th>
      {rates.map((rate, i) => {
        const cell = row.cells[i]
        return (
          <td key={rate} data-own={rate === ownRate || undefined} data-status={cell?.status}>
            {cell ? (
              <>
                <span className="cw-check-sign" data-status={cell.status} aria-hidden="true">
                  {STATUS_SIGN[cell.status]}
                </span>{' '}
                {cell.figure}
                <span className="cw-unseen">, {STATUS_WORD[cell.status]}</span>
              </>
            ) : (
              <span className="cw-rates-none">{pending ? '…' : 'not possible'}</span>
            )}
          </td>
        )
      })}
    </tr>
  )
}

const lower = (label: string) => (/^[A-Z][a-z]/.test(label) ? label.charAt(0).toLowerCase() + label.slice(1) : label)
