// A listener for tests and benchmarks: playing, at full level, nothing else in the way.
import type { Settings } from '../../../../app/audio/worklet/messages.ts'

export const LISTENER: Settings = {
  playing: true,
  muted: false,
  level: 1,
  bypass: 'off',
  delayChange: 'glide',
  held: null,
  toneHz: 440,
  equalDb: 0,
  equalLive: false,
  inputOpen: false,
}
