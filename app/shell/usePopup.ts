// A popup comes with the first press of its button: the library behind menus and dialogs is no part of the page's first load.
import { type ComponentType, useEffect, useRef, useState } from 'react'
import { say } from './messages.ts'

type Load<P> = () => Promise<ComponentType<P>>

/**
 * The popup once it is wanted, null before, and what its button needs until then. A hand or the focus on the button fetches the code, a press
 * or an arrow (menus) puts the popup in the button's place; the popup opens itself with {@link useOpenedTrigger}.
 */
export function usePopup<P>(load: Load<P>, kind: 'menu' | 'dialog') {
  const [Popup, setPopup] = useState<ComponentType<P> | null>(null)
  const fetch = () => void load().catch(() => {})
  const open = () => void loadOrSay(load).then((loaded) => loaded && setPopup(() => loaded))
  const onKeyDown = (event: React.KeyboardEvent) => {
    if (kind !== 'menu' || (event.key !== 'ArrowDown' && event.key !== 'ArrowUp')) return
    event.preventDefault()
    open()
  }
  const closed = { 'aria-haspopup': kind, 'aria-expanded': false, onPointerEnter: fetch, onFocus: fetch, onClick: open, onKeyDown } as const
  return [Popup, Popup === null ? closed : {}] as const
}

/** The part, or null with a message when it could not be fetched. */
export async function loadOrSay<T>(load: () => Promise<T>): Promise<T | null> {
  try {
    return await load()
  } catch {
    say('refusal', 'This part of the page could not be fetched', ['Is the server it came from still running? Then try again.'])
    return null
  }
}

/** For a popup's trigger: presses it once, when it has taken the place of the button that was pressed, and gives it that button's focus. */
export function useOpenedTrigger(): React.RefObject<HTMLButtonElement | null> {
  const trigger = useRef<HTMLButtonElement>(null)
  const pressed = useRef(false)
  useEffect(() => {
    if (pressed.current) return
    pressed.current = true
    trigger.current?.focus()
    trigger.current?.click()
  }, [])
  return trigger
}
