// MathML elements, which the types of React leave out.
import type { HTMLAttributes, Key, ReactNode } from 'react'

interface MathAttributes extends HTMLAttributes<MathMLElement> {
  readonly key?: Key
  readonly children?: ReactNode
  readonly display?: 'block' | 'inline'
  readonly stretchy?: 'true' | 'false'
  readonly form?: 'prefix' | 'infix' | 'postfix'
}

declare module 'react' {
  namespace JSX {
    interface IntrinsicElements {
      math: MathAttributes
      mrow: MathAttributes
      mi: MathAttributes
      mn: MathAttributes
      mo: MathAttributes
      mtext: MathAttributes
      msub: MathAttributes
      msup: MathAttributes
      munder: MathAttributes
    }
  }
}
