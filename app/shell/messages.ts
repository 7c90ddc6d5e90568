// What the page has to say and keeps on show until it is dismissed: refusals, what was not kept.
import { create } from 'zustand'

export interface Message {
  readonly id: number
  readonly kind: 'refusal' | 'note'
  readonly title: string
  readonly lines: readonly string[]
}

export const useMessages = create<{ readonly messages: readonly Message[] }>()(() => ({ messages: [] }))

const MOST = 4
let nextId = 1

/** Shows a message; one with the same title takes the older one's place. */
export function say(kind: Message['kind'], title: string, lines: readonly string[] = []): void {
  const message: Message = { id: nextId++, kind, title, lines }
  useMessages.setState(({ messages }) => ({ messages: [...messages.filter((m) => m.title !== title), message].slice(-MOST) }))
}

export function dismiss(id: number): void {
  useMessages.setState(({ messages }) => ({ messages: messages.filter((m) => m.id !== id) }))
}

/** Something of the kind went well after all: what was refused before no longer stands in the way. */
export function dismissRefusals(): void {
  useMessages.setState(({ messages }) => ({ messages: messages.filter((m) => m.kind !== 'refusal') }))
}

/** Dismisses the newest; false when there is none. */
export function dismissNewest(): boolean {
  const newest = useMessages.getState().messages.at(-1)
  if (newest) dismiss(newest.id)
  return newest !== undefined
}
