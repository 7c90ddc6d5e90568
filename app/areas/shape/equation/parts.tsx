// Small pieces of the difference equation in MathML. Numbers of the set carry the colour of now.
import { Fragment, type ReactNode } from 'react'
import { showNumber } from '../../../fields/quantity.ts'

/** A number of today's set, with a real minus sign. */
export function Now({ value, unit = '' }: { readonly value: number; readonly unit?: string }) {
  const rounded = Number(value.toPrecision(value !== 0 && Math.abs(value) < 0.1 ? 2 : 3))
  return (
    <mn className="cw-eq-now">
      {showNumber(rounded, { kind: Number.isInteger(rounded) && Math.abs(rounded) >= 10 ? 'integer' : 'number', unit })}
    </mn>
  )
}

/** A number that may lead a term: its sign stands before it as an operator, "+ 0.71" or "− 0.71"; first terms show only a minus. */
export function Signed({
  value,
  first = false,
  both = false,
}: {
  readonly value: number
  readonly first?: boolean
  readonly both?: boolean
}) {
  const sign = both ? '±' : value < 0 ? '−' : first ? null : '+'
  return (
    <>
      {sign && <mo form={first ? 'prefix' : 'infix'}>{sign}</mo>}
      <Now value={Math.abs(value)} />
    </>
  )
}

export interface At {
  readonly of: string
  /** Channel or line, "c"; absent with one. */
  readonly sub?: string | undefined
  /** What is taken from n; absent reads at n. */
  readonly ago?: ReactNode
}

/** A signal at a sample: w_c[n − D]. */
export function Signal({ of, sub, ago }: At) {
  return (
    <mrow>
      <Name of={of} sub={sub} />
      <mo stretchy="false">[</mo>
      <mi>n</mi>
      {ago && (
        <>
          <mo>−</mo>
          {ago}
        </>
      )}
      <mo stretchy="false">]</mo>
    </mrow>
  )
}

export function Name({ of, sub }: { readonly of: string; readonly sub?: string | undefined }) {
  if (!sub) return <mi>{of}</mi>
  return (
    <msub>
      <mi>{of}</mi>
      <mi>{sub}</mi>
    </msub>
  )
}

/** A named function around what it takes: damp(…). */
export function Call({ name, children }: { readonly name: ReactNode; readonly children: ReactNode }) {
  return (
    <mrow>
      {typeof name === 'string' ? <mi className="cw-eq-function">{name}</mi> : name}
      <mo stretchy="false">(</mo>
      {children}
      <mo stretchy="false">)</mo>
    </mrow>
  )
}

/** Terms one after another, each its own sign. */
export function Row({ children }: { readonly children: readonly ReactNode[] }) {
  return (
    <mrow>
      {children.map((child, i) => (
        // biome-ignore lint/suspicious/noArrayIndexKey: the terms of one equation keep their order.
        <Fragment key={i}>{child}</Fragment>
      ))}
    </mrow>
  )
}
