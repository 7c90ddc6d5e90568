// The built-in phrases by name: what a menu shows, apart from what makes them.

export type PhraseId = 'pluckedChords' | 'bassLine' | 'drumBar' | 'heldChord' | 'noise' | 'impulse' | 'tone'

export interface PhraseInfo {
  readonly id: PhraseId
  readonly label: string
  /** What it is good for hearing, one sentence. */
  readonly about: string
}

export const PHRASES: readonly PhraseInfo[] = [
  {
    id: 'pluckedChords',
    label: 'Plucked chords',
    about: 'Strummed strings with attack, decay and a wide spectrum: the usual judge of chorus and flanger.',
  },
  { id: 'bassLine', label: 'Bass line', about: 'Low notes from 44 Hz: shows what a comb takes from the fundamental.' },
  { id: 'drumBar', label: 'Drum bar', about: 'Kick, snare and hat: short attacks show echoes and ringing, the noise shows the sweep.' },
  { id: 'heldChord', label: 'Held chord', about: 'A rich chord that never changes: all that moves is the effect.' },
  { id: 'noise', label: 'Pink noise', about: 'Equal power in every octave: every notch and peak can be heard.' },
  { id: 'impulse', label: 'Impulses', about: 'One sample a second: every echo shows in the scope.' },
  { id: 'tone', label: 'Tone', about: 'A sine of any frequency and level: pitch wobble and steps of the sweep.' },
]
