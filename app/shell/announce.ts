// What is spoken once, after an act or a gesture, to those who hear the page instead of seeing it. One polite live region.
import { create } from 'zustand'

export const useAnnouncement = create<{ readonly text: string }>()(() => ({ text: '' }))

/** Speaks a sentence. The same one twice in a row is spoken again. */
export function announce(text: string): void {
  const { text: before } = useAnnouncement.getState()
  useAnnouncement.setState({ text: before === text ? `${text}\u200b` : text })
}
