// The fields of one shaper: its curve, and the rest while it is there. What follows from its values is fetched with the first shaper.
import { type ComponentType, useEffect, useState } from 'react'
import { getAt } from '../../../../src/set/path.ts'
import type { Shaper } from '../../../../src/set/types.ts'
import { loadOrSay } from '../../../shell/usePopup.ts'
import { useCurrent } from '../../../state/current.ts'
import { SetField } from './SetField.tsx'

export type ShaperOwner = 'input.shaper' | 'loop.shaper' | 'mix.shaper'

export interface ShaperBodyProps {
  readonly owner: ShaperOwner
  readonly shaper: Shaper
}

type Body = ComponentType<ShaperBodyProps>
const loadBody = (): Promise<Body> => import('./ShaperBody.tsx').then((part) => part.ShaperBody)
let loaded: Body | null = null

export function ShaperFields({ owner }: { readonly owner: ShaperOwner }) {
  const shaper = useCurrent((s) => getAt(s.set, owner)) as Shaper | null
  const [Body, setBody] = useState(() => loaded)
  const wanted = shaper !== null && Body === null
  useEffect(() => {
    if (!wanted) return
    let gone = false
    void loadOrSay(loadBody).then((body) => {
      loaded = body
      if (!gone && body) setBody(() => body)
    })
    return () => {
      gone = true
    }
  }, [wanted])
  return (
    <>
      <SetField path={`${owner}.curve`} label="Curve" />
      {shaper && Body && <Body owner={owner} shaper={shaper} />}
    </>
  )
}
